import { afterAll, beforeAll, expect, test } from 'vitest';
import { isComplete, pruneAnswers } from '#shared/check-ins/answering.ts';
import { answersSchema } from '#shared/check-ins/answers.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { inOrder, type Finding } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import { demoClinicId } from '#server/demo/clinic.ts';
import { alerts, checkIns } from '#server/db/schema/check-ins.ts';
import { findings, flags } from '#server/db/schema/flags.ts';
import { withTx, type Tx } from '#server/db/with-tx.ts';
import { ruleContext } from '#server/features/check-ins/context.ts';
import { historyBefore, type AlertRow, type CheckInRow } from '#server/features/check-ins/queries.ts';
import { chartOf, type Chart } from '#server/features/plans/queries.ts';
import { demoDatabase, type DemoDatabase } from './demo.ts';

/** A Tuesday, 10:50 in the clinic. */
const now = new Date('2026-12-01T15:50:00Z');
let demo: DemoDatabase;

type Judged = { row: CheckInRow; chart: Chart; found: Finding[]; stored: Finding[] | null };
let judged: Judged[];
let judgedAlerts: { row: AlertRow; found: Finding[] }[];

const judgeAll = async (tx: Tx) => {
  const charts = new Map<string, Chart>();
  const flagRows = await tx.select().from(flags);
  const findingRows = await tx.select().from(findings);
  const findIn = async (row: CheckInRow | AlertRow) => {
    const chart = charts.get(row.patientId) ?? (await chartOf(tx, demoClinicId, row.patientId));
    charts.set(row.patientId, chart);
    const history = await historyBefore(tx, demoClinicId, row.patientId, row.answeredAt);
    const found = evaluate({
      answers: row.answers,
      history,
      ...ruleContext(chart, now, row.localDate),
      rules,
    });
    return { chart, found };
  };
  judged = [];
  for (const row of await tx.select().from(checkIns)) {
    const flag = flagRows.find(({ sourceClientId }) => sourceClientId === row.clientId);
    const stored = findingRows
      .filter(({ flagId }) => flagId === flag?.id)
      .map(({ code, ruleVersion, urgency, values }) => ({ code, ruleVersion, urgency, values }));
    judged.push({ row, ...(await findIn(row)), stored: flag ? inOrder(stored) : null });
  }
  judgedAlerts = [];
  for (const row of await tx.select().from(alerts)) judgedAlerts.push({ row, ...(await findIn(row)) });
  return flagRows;
};

let flagRows: Awaited<ReturnType<typeof judgeAll>>;

beforeAll(async () => {
  demo = await demoDatabase();
  await demo.act('fill', now);
  flagRows = await withTx(demo.pools.app, { kind: 'system', clinicId: demoClinicId }, judgeAll);
});

afterAll(() => demo.drop());

test('every stored flag is what the rules find when its check-in is judged again', () => {
  const flagged = judged.filter(({ stored }) => stored !== null);
  expect(flagged).toHaveLength(flagRows.length);
  for (const { found, stored } of flagged) expect(found).toEqual(stored);
});

test('the urgency of a flag is the highest of its findings', () => {
  for (const { row, stored } of judged) {
    const flag = flagRows.find(({ sourceClientId }) => sourceClientId === row.clientId);
    expect(flag?.urgency ?? null).toBe(stored?.[0]?.urgency ?? null);
  }
});

test('no check-in without a flag has a finding', () => {
  const missed = judged.filter(({ stored, found }) => stored === null && found.length > 0);
  expect(missed).toEqual([]);
  expect(judged.length).toBeGreaterThan(1200);
});

test('an alert was sent before its check-in, and the rules find in it what made the flag', () => {
  expect(judgedAlerts).toHaveLength(1);
  for (const { row, found } of judgedAlerts) {
    const joined = judged.find((one) => one.row.clientId === row.checkInClientId)!;
    expect(row.receivedAt.getTime()).toBeLessThan(joined.row.receivedAt.getTime());
    expect(found.map(({ code, urgency }) => ({ code, urgency }))).toEqual(
      joined.stored!.map(({ code, urgency }) => ({ code, urgency })),
    );
  }
});

test('every check-in could have been given on the screens: all that was asked is answered and nothing else', () => {
  for (const { row, chart } of judged) {
    const mode = row.kind === 'daily' ? 'full' : 'something-new';
    expect(answersSchema.parse(row.answers)).toEqual(row.answers);
    expect(pruneAnswers(row.answers)).toEqual(row.answers);
    expect(isComplete(row.answers, ruleContext(chart, now, row.localDate), mode), row.id).toBe(true);
  }
});

test('this morning holds the round of the scenario', () => {
  const open = flagRows.filter(({ state }) => state !== 'closed');
  const codes = open.map(({ urgency, state, sourceClientId }) => {
    const { chart, found } = judged.find(({ row }) => row.clientId === sourceClientId)!;
    return `${chart.name}: ${urgency}, ${state}: ${found.map(({ code }) => code).join(', ')}`;
  });
  expect(codes.sort()).toEqual([
    'Anahit Ter-Hovhannisyan: same-day, open: pain-severe',
    'Anselm Okwuosa: urgent, open: fall-with-injury, fall, pain-severe, pain-rise',
    'Hal Brandvold: same-day, open: unclassified',
    'José Ángel Etxeberria Mendizábal: same-day, open: pop-alone',
    'Kamalakshi Venkatasubramanian: same-day, open: fall',
    'Leocadia Wolańska-Brzęczyszczykiewicz: urgent, open: wound-pus',
    'Nguyễn Thị Lan Hương: same-day, open: fever',
    'Rukmini Dass: same-day, open: pain-rise',
    'Wendell Pryce: emergency, claimed: chest-or-breathing',
    'Zdeněk Hřebíček: same-day, claimed: unclassified',
    'Þórunn Guðmundsdóttir: urgent, claimed: clot-leg',
  ]);
});

// Reference bands of the domain: pain peaks about day 2 at 5.1 ± 2.7, and lies two thirds below the
// pre-operative value (about 5.8 here) at three months.
test('pain peaks in the first week and falls to about a third of what it was before surgery', () => {
  const meanBetween = (from: number, to: number): number => {
    const pains = judged.flatMap(({ row, chart, stored }) => {
      const { day } = ruleContext(chart, now, row.localDate);
      const { painNow } = row.answers;
      return stored === null && painNow !== undefined && day >= from && day <= to ? [painNow] : [];
    });
    return pains.reduce((sum, pain) => sum + pain, 0) / pains.length;
  };
  expect(meanBetween(2, 3)).toBeGreaterThan(4.2);
  expect(meanBetween(2, 3)).toBeLessThan(6);
  expect(meanBetween(12, 16)).toBeCloseTo(3.65, 0);
  expect(meanBetween(84, 120)).toBeCloseTo(1.9, 0);
});
