import { and, eq, isNull, ne } from 'drizzle-orm';
import type { PatientRecord } from '#shared/patients/contract.ts';
import {
  consequences,
  stateAfter,
  stateOn,
  type PatientMove,
  type PatientState,
} from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { patients, patientStateChanges } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import { threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { notify } from '../../notifications/service.ts';
import { announce, announcePersonChange } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { activeCaregiversOf } from '../caregivers/queries.ts';
import { endAccess } from '../people/access.ts';
import { revokeInvitations } from '../people/inviting.ts';
import { announceThread } from '../threads/append.ts';
import { chartVisibleTo, type PatientRow } from './door.ts';
import { lineOf } from './queries.ts';
import { recordOf } from './record.ts';

type Move = { patientId: string; move: PatientMove; reason: string; backOn: string | null };

const refuseBackOn = ({ move, backOn }: Move, today: string): void => {
  if (backOn === null) return;
  const refuse = (message: string) =>
    new Problem('invalid-input', undefined, { errors: [{ field: 'backOn', message }] });
  if (move !== 'pause') throw refuse('Only a pause has a day of return.');
  if (backOn < today) throw refuse('That day is past.');
};

/** Whoever's update comes first moves the patient; the other is told that it changed in the meantime. */
const guardedMove = async (tx: Tx, { clinicId, id, state }: PatientRow, to: PatientState): Promise<void> => {
  const moved = await tx
    .update(patients)
    .set({ state: to })
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, id), eq(patients.state, state)))
    .returning({ id: patients.id });
  if (moved.length === 0) throw new Problem('state-conflict');
};

/** Threads that nobody watches any more are closed, on every screen that shows them. */
const closeThreads = async (tx: Tx, { clinicId, id, personId }: PatientRow, today: string): Promise<void> => {
  const closed = await tx
    .update(threads)
    .set({ state: 'closed' })
    .where(and(eq(threads.clinicId, clinicId), eq(threads.patientId, id), ne(threads.state, 'closed')))
    .returning();
  for (const thread of closed) await announceThread(tx, thread, { personId, today }, thread.lastSequence);
};

/** Nobody signs in for a record that has ended. Who is more than its patient keeps the rest. */
const endSignIn = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  patient: PatientRow,
  now: Date,
): Promise<void> => {
  const { clinicId, personId } = patient;
  await tx
    .update(caregivers)
    .set({ endedAt: now, endedBy: actor.personId })
    .where(
      and(
        eq(caregivers.clinicId, clinicId),
        eq(caregivers.patientId, patient.id),
        isNull(caregivers.endedAt),
      ),
    );
  await tx
    .delete(personRoles)
    .where(
      and(
        eq(personRoles.clinicId, clinicId),
        eq(personRoles.personId, personId),
        eq(personRoles.role, 'patient'),
      ),
    );
  const others = await tx.$count(
    personRoles,
    and(eq(personRoles.clinicId, clinicId), eq(personRoles.personId, personId)),
  );
  if (others > 0) return;
  await tx
    .update(people)
    .set({ active: false, deactivatedAt: now })
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  await revokeInvitations(tx, site, patient, now);
  await endAccess(tx, site, patient, now);
};

/** Pauses, resumes, discharges, takes back or ends, with all that follows from the new state. */
export const move = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  input: Move,
  now: Date,
): Promise<PatientRecord> => {
  const { patientId } = input;
  const patient = await chartVisibleTo(tx, actor, patientId, now);
  const { surgeryDate, timeZone } = await lineOf(tx, actor, patientId);
  const today = localDateIn(timeZone, now);
  const from = stateOn(patient.state, surgeryDate, today);
  const to = stateAfter(from, input.move);
  if (!to) throw new Problem('state-conflict', `This patient is ${from}.`);
  refuseBackOn(input, today);
  await guardedMove(tx, patient, to);

  const { clinicId, personId } = patient;
  const caring = await activeCaregiversOf(tx, { clinicId, patientId, today });
  const rows = await tx
    .insert(patientStateChanges)
    .values({
      clinicId,
      patientId,
      fromState: from,
      toState: to,
      reason: input.reason,
      backOn: input.backOn,
      byPersonId: actor.personId,
      at: now,
    })
    .returning({ id: patientStateChanges.id });
  const changeId = rows[0]?.id;
  if (!changeId) throw new Error('A change that was just written is not there.');
  if (!consequences[to].threads) await closeThreads(tx, patient, today);
  if (to === 'discharged') {
    const told = { kind: 'watching-ended', occasion: `state-change:${changeId}`, path: '/today' } as const;
    await notify(tx, clinicId, [personId], told, now);
  }
  if (!consequences[to].signIn) await endSignIn(tx, site, actor, patient, now);
  const detail = { from, to };
  await writeAudit(tx, actor, { action: 'patient.moved', subjectId: changeId, patientId, detail }, now);
  await announce(tx, { patient: patientId }, { topic: 'today' });
  for (const one of [personId, ...caring.map((caregiver) => caregiver.personId)]) {
    await announcePersonChange(tx, one);
  }
  return recordOf(tx, site, actor, patientId, now);
};
