import type { Answers } from '#shared/check-ins/answers.ts';
import { usualOf, type EarlierCheckIn } from '#shared/check-ins/usual.ts';
import { addDays, dayPostOp, type LocalDate } from '#shared/plans/calendar.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { rules, rulesVersion } from '#shared/red-flags/rules/shipped.ts';
import { ruleContext } from '../features/check-ins/context.ts';
import type { AlertRow, CheckInRow } from '../features/check-ins/queries.ts';
import { easedAnswers, ordinaryAnswers, withAnswers } from './answers.ts';
import { checkInDaysOf, daysOfUsual, type PlannedCheckIn } from './check-in-days.ts';
import { demoClinicId } from './clinic.ts';
import { drawIncident, type Resolution } from './incidents.ts';
import { clock, instantAt, secondsAfter } from './moments.ts';
import { drawCourse, expectedPain } from './pain.ts';
import { idOf, randomFor, type Random } from './random.ts';
import type { PatientRecord } from './records.ts';
import { onDuty, type Handling, type Script } from './scenario.ts';

export type DemoCheckIn = {
  row: CheckInRow;
  alert: AlertRow | null;
  /** What the product's own rules find in the finished check-in. */
  findings: Finding[];
  handling: Handling | null;
};

type RuleContext = ReturnType<typeof ruleContext>;
type Answered = { answers: Answers; handling: Handling | null };

/** Of the check-ins of the past, how many bring something that a clinician looks at. */
const incidentRate = 0.03;
/** So long before today nothing unforeseen happens to those whose usual is told. */
const plainDays = 6;

/** How an older flag went: seen and closed on the same day, by the therapist or whoever was on call. */
const closedSameDay = (
  { patient }: PatientRecord,
  { date, minutes }: PlannedCheckIn,
  resolution: Resolution,
  random: Random,
): Handling => {
  const seenAt = Math.max(minutes, clock('8:00')) + random.int(4, 70);
  const at = seenAt + random.int(12, 240);
  return {
    by: onDuty(patient.lead, date),
    seenAt,
    claimedAt: seenAt + 1,
    ...(resolution.reply === null ? {} : { reply: { at: at - 2, text: resolution.reply } }),
    closed: { at, resolution },
  };
};

const rowOf = (
  { chart, patient, surgeryDate }: PatientRecord,
  { date, minutes, scripted }: PlannedCheckIn,
  answers: Answers,
  random: Random,
): CheckInRow => {
  const kind = scripted?.kind ?? 'daily';
  const named = [patient.name, dayPostOp(surgeryDate, date), kind];
  const answeredAt = instantAt(date, minutes, random.int(0, 59));
  const receivedAt = secondsAfter(answeredAt, random.int(1, 4));
  return {
    clinicId: demoClinicId,
    id: idOf('check-in', ...named),
    patientId: chart.patient.id,
    authorId: chart.patient.personId,
    clientId: idOf('check-in-of-device', ...named),
    kind,
    answers,
    answeredAt,
    receivedAt,
    localDate: date,
    clockDoubtful: false,
    answeredAtDevice: null,
    rulesVersion,
    evaluatedAt: secondsAfter(receivedAt, 0.2 + random.next() / 2),
  };
};

const alertOf = (row: CheckInRow, { scripted }: PlannedCheckIn): AlertRow | null => {
  if (!scripted?.alert) return null;
  const { clinicId, patientId, authorId, localDate, clockDoubtful, clientId } = row;
  const { answers, secondsBefore } = scripted.alert;
  const receivedAt = secondsAfter(row.receivedAt, -secondsBefore);
  return {
    clinicId,
    id: idOf('alert', clientId),
    patientId,
    authorId,
    clientId: idOf('alert-of-device', clientId),
    checkInClientId: clientId,
    answers,
    answeredAt: secondsAfter(row.answeredAt, -secondsBefore),
    receivedAt,
    localDate,
    clockDoubtful,
    rulesVersion,
    evaluatedAt: secondsAfter(receivedAt, 0.3),
    answeredAtDevice: null,
  };
};

/** All check-ins of one patient, oldest first, each judged by the shipped rules against those before it. */
export const historyOf = (record: PatientRecord, script: Script, today: LocalDate): DemoCheckIn[] => {
  const { patient, chart } = record;
  const random = randomFor('history', patient.name);
  const course = drawCourse(random);
  const newestFirst: EarlierCheckIn[] = [];
  let mood = 0;

  const findingsIn = (answers: Answers, context: RuleContext): Finding[] =>
    evaluate({ answers, history: newestFirst, ...context, rules });

  const ordinaryOn = (date: LocalDate, context: RuleContext): Answers => {
    mood = 0.6 * mood + 0.55 * random.normal();
    const pain = expectedPain(course, context.day) + mood;
    let answers = ordinaryAnswers({ ...context, ...context.operationCard, pain }, random);
    while (findingsIn(answers, context).length > 0) {
      if (answers.painNow === 0) throw new Error('An ordinary day that the rules mind even without pain.');
      answers = easedAnswers(answers);
    }
    const isUsual = date < today && date >= addDays(today, -daysOfUsual);
    return script.usual && isUsual ? withAnswers(answers, script.usual) : answers;
  };

  const answeredOn = (planned: PlannedCheckIn, context: RuleContext): Answered => {
    const { date, scripted } = planned;
    const ordinary = ordinaryOn(date, context);
    if (scripted) {
      const answers =
        scripted.kind === 'daily' ? withAnswers(ordinary, scripted.answers) : { ...scripted.answers };
      return { answers, handling: scripted.handling ?? null };
    }
    const isPlain = script.uneventful || (script.usual && date >= addDays(today, -plainDays));
    const happens = random.chance(incidentRate) && !isPlain && date < today;
    const incident = happens ? drawIncident(context.day, random) : null;
    if (!incident) return { answers: ordinary, handling: null };
    const painNow = usualOf(newestFirst).painNow ?? 3;
    return {
      answers: withAnswers(ordinary, incident.answers({ painNow }, random)),
      handling: closedSameDay(record, planned, random.pick(incident.resolutions), random),
    };
  };

  return checkInDaysOf(record, script, today, random).map((planned): DemoCheckIn => {
    const context = ruleContext(chart, chart.patient.createdAt, planned.date);
    const { answers, handling } = answeredOn(planned, context);
    const findings = findingsIn(answers, context);
    const row = rowOf(record, planned, answers, random);
    newestFirst.unshift({
      answeredAt: row.answeredAt.toISOString(),
      painNow: answers.painNow ?? null,
      painWorst: answers.painWorst ?? null,
      byProxy: false,
    });
    return { row, alert: alertOf(row, planned), findings, handling };
  });
};
