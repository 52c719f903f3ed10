import type { CheckInContext } from '#shared/check-ins/contract.ts';
import { usualOf } from '#shared/check-ins/usual.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening } from '../audit/service.ts';
import { checkInRecord } from '../caregivers/limits.ts';
import { chartOf, standingOf, type Chart } from '../plans/queries.ts';
import { historyBefore } from './queries.ts';

/** Whether a blood thinner is taken; null where nobody has recorded it. */
const takesBloodThinner = ({ patient }: Chart): boolean | null =>
  patient.bloodThinner === null ? null : patient.bloodThinner !== 'none';

/** What the rules read besides the answers, for a check-in of a given date; the same on phone and server. */
export const ruleContext = (chart: Chart, now: Date, date: string) => {
  const standing = standingOf(chart, now, date);
  return {
    day: standing.day,
    operationCard: { block: chart.card.block },
    safetyFacts: { bloodThinner: takesBloodThinner(chart) },
    precautionsInForce: standing.precautions.map(({ code }) => code),
  };
};

/** The check-in's context for the patient's own phone. */
export const contextFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<CheckInContext> => {
  const patientId = await checkInRecord(tx, actor);
  const chart = await chartOf(tx, actor.clinicId, patientId);
  const date = localDateIn(chart.patient.timeZone, now);
  const history = await historyBefore(tx, actor.clinicId, patientId, now);
  const { operationCard, ...facts } = ruleContext(chart, now, date);
  await auditOpening(tx, actor, { action: 'check-in.context-read', subjectId: patientId, patientId }, now);
  return {
    ...facts,
    date,
    timeZone: chart.patient.timeZone,
    lastCheckInDate: history[0]?.localDate ?? null,
    usual: usualOf(history),
    history: history.map(({ answeredAt, painNow, painWorst, byProxy }) => ({
      answeredAt,
      painNow,
      painWorst,
      byProxy,
    })),
    operationCard: { ...operationCard, arm: chart.card.arm, procedure: chart.card.procedure },
  };
};
