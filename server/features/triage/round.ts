import { usualOf } from '#shared/check-ins/usual.ts';
import { addDays, dayPostOp, daysBetween, localDateIn } from '#shared/plans/calendar.ts';
import { explain } from '#shared/red-flags/explain.ts';
import { inOrder, type Finding } from '#shared/red-flags/findings.ts';
import type { FlagCase, FlagRow, MorningRound } from '#shared/triage/contract.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening, writeAudit } from '../audit/service.ts';
import { proxyOf } from '../caregivers/queries.ts';
import { historyBefore } from '../check-ins/queries.ts';
import { clinicOf } from '../clinic/queries.ts';
import { chartOf, standingOf } from '../plans/queries.ts';
import { besideUsual } from './beside.ts';
import {
  answeredOf,
  countQuiet,
  earlierFlagsOf,
  eventsOf,
  findingsOfFlags,
  flagVisibleTo,
  openRows,
  painBetween,
  rowOf,
  threadOfFlag,
  type RoundRow,
} from './queries.ts';

const daysShown = 14;

/** The most urgent reason in words; further reasons are counted, never hidden. */
const headlineOf = (found: readonly Finding[]): string => {
  const [first, ...others] = inOrder(found);
  if (!first) return '';
  const { title } = explain(first);
  return others.length === 0 ? title : `${title} (and ${others.length} more)`;
};

type PainDay = { localDate: string; value: number | null };

/** One value a day, oldest first; the last of a day counts, a day without one is a gap. */
const byDay = (rows: readonly PainDay[], last: string): (number | null)[] => {
  const values = Array.from({ length: daysShown }, (): number | null => null);
  for (const { localDate, value } of rows) {
    const index = daysShown - 1 - daysBetween(localDate, last);
    if (index >= 0 && index < daysShown && value !== null) values[index] = value;
  }
  return values;
};

type RowFacts = {
  found: Finding[];
  pain: { localDate: string; painNow: number | null; byProxy: boolean }[];
  date: string;
};

const toRow = (row: RoundRow, { found, pain, date }: RowFacts): FlagRow => {
  const { flag } = row;
  const before = pain.filter(({ localDate }) => localDate < localDateIn(row.timeZone, flag.raisedAt));
  return {
    id: flag.id,
    state: flag.state,
    urgency: flag.urgency,
    patient: {
      id: flag.patientId,
      name: row.name,
      day: dayPostOp(row.surgeryDate, date),
      arm: row.arm,
      procedure: row.procedure,
    },
    headline: headlineOf(found),
    raisedAt: flag.raisedAt.toISOString(),
    claimedBy:
      flag.claimedBy && row.claimedByName ? { personId: flag.claimedBy, name: row.claimedByName } : null,
    claimedAt: flag.claimedAt?.toISOString() ?? null,
    calledMistakeAt: row.calledMistakeAt,
    pain14: byDay(
      pain.map(({ localDate, painNow }) => ({ localDate, value: painNow })),
      date,
    ),
    usualPain: usualOf(
      before.map(({ localDate, painNow, byProxy }) => ({
        answeredAt: `${localDate}T12:00:00Z`,
        painNow,
        painWorst: null,
        byProxy,
      })),
    ).painNow,
  };
};

const rowsOf = async (tx: Tx, clinicId: string, rows: readonly RoundRow[], now: Date): Promise<FlagRow[]> => {
  const found = await findingsOfFlags(
    tx,
    clinicId,
    rows.map(({ flag }) => flag.id),
  );
  // A patient's zone can be a day ahead of or behind the server's: a day more on both sides covers it.
  const utcDate = localDateIn('UTC', now);
  const pain = await painBetween(
    tx,
    clinicId,
    rows.map(({ flag }) => flag.patientId),
    addDays(utcDate, -daysShown - 1),
    addDays(utcDate, 1),
  );
  return rows.map((row) =>
    toRow(row, {
      found: found.get(row.flag.id) ?? [],
      pain: pain.filter(({ patientId }) => patientId === row.flag.patientId),
      date: localDateIn(row.timeZone, now),
    }),
  );
};

/** The morning round: what is open or claimed, by urgency and age, and how many checked in quietly. */
export const roundFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<MorningRound> => {
  const { timeZone } = await clinicOf(tx, actor.clinicId);
  const date = localDateIn(timeZone, now);
  const rows = await openRows(tx, actor.clinicId);
  await writeAudit(tx, actor, { action: 'round.listed', detail: { count: rows.length } }, now);
  return {
    date,
    flags: await rowsOf(tx, actor.clinicId, rows, now),
    quiet: await countQuiet(tx, actor.clinicId, date),
  };
};

/** One flag as a row of the round, after something was done to it. */
export const flagRowOf = async (tx: Tx, actor: PersonActor, flagId: string, now: Date): Promise<FlagRow> => {
  const [row] = await rowsOf(tx, actor.clinicId, [await rowOf(tx, actor.clinicId, flagId)], now);
  if (!row) throw new Error('A flag that was just read is not there.');
  return row;
};

const ageOn = (birthDate: string, date: string): number => {
  const years = Number(date.slice(0, 4)) - Number(birthDate.slice(0, 4));
  return date.slice(5) < birthDate.slice(5) ? years - 1 : years;
};

/** Everything needed to decide about a flag, on one screen. Opening it is on record. */
export const caseFor = async (tx: Tx, actor: PersonActor, flagId: string, now: Date): Promise<FlagCase> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  const row = await flagRowOf(tx, actor, flagId, now);
  const chart = await chartOf(tx, actor.clinicId, flag.patientId);
  const { answers, answeredAt, localDate } = await answeredOf(tx, flag);
  const proxy = await proxyOf(tx, flag.clinicId, flag.patientId, flag.sourceAuthorId);
  const standing = standingOf(chart, now);
  const history = await historyBefore(tx, actor.clinicId, flag.patientId, answeredAt);
  const from = addDays(localDate, 1 - daysShown);
  const pain = await painBetween(tx, actor.clinicId, [flag.patientId], from, localDate);
  const earlier = await earlierFlagsOf(tx, flag);
  const found = await findingsOfFlags(tx, actor.clinicId, [flag.id, ...earlier.map(({ id }) => id)]);
  await auditOpening(
    tx,
    actor,
    { action: 'case.opened', subjectId: flag.id, patientId: flag.patientId },
    now,
  );
  const { patient, card } = chart;
  return {
    ...row,
    reasons: inOrder(found.get(flag.id) ?? []).map((finding) => ({
      code: finding.code,
      urgency: finding.urgency,
      ...explain(finding),
    })),
    person: {
      age: ageOn(patient.birthDate, localDateIn(patient.timeZone, now)),
      phone: patient.phone,
      surgeon: card.surgeon,
      phase: standing.phase?.name ?? 'Before surgery',
      emergencyContact: patient.emergencyContact,
      bloodThinner: patient.bloodThinner,
      allergies: patient.allergies,
      chartNumber: patient.chartNumber,
      language: patient.language,
    },
    beside: besideUsual(answers, usualOf(history), {
      painNow: byDay(
        pain.map(({ localDate: on, painNow }) => ({ localDate: on, value: painNow })),
        localDate,
      ),
      painWorst: byDay(
        pain.map(({ localDate: on, painWorst }) => ({ localDate: on, value: painWorst })),
        localDate,
      ),
    }),
    answeredAt: answeredAt.toISOString(),
    ...(proxy ? { answeredBy: proxy } : {}),
    note: answers.note?.trim() || null,
    inForce: standing.precautions.map(({ code, clinicianText, usualDate, due }) => ({
      code,
      text: clinicianText,
      usualDate,
      due,
    })),
    events: (await eventsOf(tx, flag)).map((event) => ({ ...event, at: event.at.toISOString() })),
    earlier: earlier.map((one) => ({
      id: one.id,
      raisedAt: one.raisedAt.toISOString(),
      urgency: one.urgency,
      headline: headlineOf(found.get(one.id) ?? []),
      state: one.state,
    })),
    threadId: await threadOfFlag(tx, flag),
    outcome: flag.outcome,
  };
};
