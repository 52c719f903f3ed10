import { and, eq } from 'drizzle-orm';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import type { SystemActor } from '../../db/actor.ts';
import { alertMistakes, alerts, checkIns } from '../../db/schema/check-ins.ts';
import type { Tx } from '../../db/with-tx.ts';
import { chartOf } from '../plans/queries.ts';
import { raiseFlag, type FlagSource } from '../triage/raising.ts';
import { noteMistake } from '../triage/service.ts';
import { ruleContext } from './context.ts';
import { historyBefore, type AlertRow, type CheckInRow } from './queries.ts';

type Answered = CheckInRow | AlertRow;

const findingsOf = async (tx: Tx, row: Answered, now: Date) => {
  const chart = await chartOf(tx, row.clinicId, row.patientId);
  return evaluate({
    answers: row.answers,
    history: await historyBefore(tx, row.clinicId, row.patientId, row.answeredAt),
    ...ruleContext(chart, now, row.localDate),
    rules,
  });
};

const sourceOf = (row: Answered): FlagSource => ({
  kind: 'checkInClientId' in row ? 'alert' : 'check-in',
  id: row.id,
  patientId: row.patientId,
  authorId: row.authorId,
  checkInClientId: 'checkInClientId' in row ? row.checkInClientId : row.clientId,
  receivedAt: row.receivedAt,
});

/**
 * Runs the rules over a check-in and raises its flag. Safe to run twice and at the same time as another run:
 * the row is locked, and what is evaluated stays so.
 */
export const evaluateCheckIn = async (
  tx: Tx,
  actor: SystemActor,
  checkInId: string,
  now: Date,
): Promise<'evaluated' | 'nothing-to-do'> => {
  const here = and(eq(checkIns.clinicId, actor.clinicId), eq(checkIns.id, checkInId));
  const rows = await tx.select().from(checkIns).where(here).for('no key update');
  const row = rows[0];
  if (!row || row.evaluatedAt) return 'nothing-to-do';
  const findings = await findingsOf(tx, row, now);
  if (findings.length > 0) await raiseFlag(tx, actor, sourceOf(row), findings, now);
  await tx.update(checkIns).set({ evaluatedAt: now }).where(here);
  return 'evaluated';
};

/** The same for an alert sent at the tick; its flag is the one that the finished check-in will join. */
export const evaluateAlert = async (
  tx: Tx,
  actor: SystemActor,
  alertId: string,
  now: Date,
): Promise<'evaluated' | 'nothing-to-do'> => {
  const here = and(eq(alerts.clinicId, actor.clinicId), eq(alerts.id, alertId));
  const rows = await tx.select().from(alerts).where(here).for('no key update');
  const row = rows[0];
  if (!row || row.evaluatedAt) return 'nothing-to-do';
  const findings = await findingsOf(tx, row, now);
  if (findings.length > 0) await raiseFlag(tx, actor, sourceOf(row), findings, now);
  await tx.update(alerts).set({ evaluatedAt: now }).where(here);
  const mistakes = await tx.$count(
    alertMistakes,
    and(eq(alertMistakes.clinicId, row.clinicId), eq(alertMistakes.alertId, row.id)),
  );
  if (mistakes > 0) await noteMistake(tx, row, now);
  return 'evaluated';
};
