import { and, eq, inArray, sql } from 'drizzle-orm';
import { consequences, stateOn } from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import { operationCards, patients } from '../../db/schema/patients.ts';
import { personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { activeCaregiversOf } from '../caregivers/queries.ts';
import { clinicOf } from '../clinic/queries.ts';
import { peopleToTell } from '../triage/people-to-tell.ts';
import type { ThreadRow } from './queries.ts';

type OfPatient = { clinicId: string; patientId: string };

/**
 * The patient of a thread, with the row held: their state stands still until a message is in. It comes before the
 * thread's own lock, in the order that a discharge takes them.
 */
export const holdPatient = async (tx: Tx, { clinicId, patientId }: OfPatient, now: Date) => {
  const rows = await tx
    .select({
      personId: patients.personId,
      state: patients.state,
      timeZone: patients.timeZone,
      surgeryDate: operationCards.surgeryDate,
    })
    .from(patients)
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)))
    .for('share', { of: patients });
  const row = rows[0];
  if (!row) throw new Error('A thread without its patient.');
  const today = localDateIn(row.timeZone, now);
  return { personId: row.personId, today, state: stateOn(row.state, row.surgeryDate, today) };
};

type HeldPatient = Awaited<ReturnType<typeof holdPatient>>;

/** A thread that nobody watches takes no message: it would look as if somebody read it. */
export const refuseUnwatched = async (
  tx: Tx,
  clinicId: string,
  { state }: HeldPatient,
  side: 'patient' | 'clinic',
): Promise<void> => {
  if (consequences[state].threads) return;
  if (side === 'clinic') {
    throw new Problem('not-watched', 'Monitoring has ended for this patient. Take the patient back first.');
  }
  const { emergencyNumber, phone } = await clinicOf(tx, clinicId);
  throw new Problem(
    'not-watched',
    `Nobody reads messages here any more. Call the clinic on ${phone}; in an emergency call ${emergencyNumber}.`,
  );
};

type Watchers = {
  /** The patient, and the caregivers who may message. */
  patientSide: string[];
  /** The care team, and the clinicians who took part. */
  team: string[];
  /** Everybody whose screens show the thread. */
  all: string[];
};

/** Everybody whom a thread concerns now, by person: ids only. A caregiver whose help has ended is none of them. */
export const watchersOf = async (
  tx: Tx,
  thread: ThreadRow,
  { personId, today }: Pick<HeldPatient, 'personId' | 'today'>,
): Promise<Watchers> => {
  const caring = await activeCaregiversOf(tx, { ...thread, today });
  const patientSide = [
    personId,
    ...caring.flatMap((one) => (one.mayMessage && one.personId !== personId ? [one.personId] : [])),
  ];
  const { rows } = await tx.execute<{ person_id: string; is_team: boolean }>(sql`
    select person_id, bool_or(is_team) as is_team from (
      select c.person_id, true as is_team from care_team_members c
        where c.clinic_id = ${thread.clinicId} and c.patient_id = ${thread.patientId}
      union all
      select t.person_id, true from thread_participants t
        where t.clinic_id = ${thread.clinicId} and t.thread_id = ${thread.id} and t.side = 'clinic'
      union all
      select r.person_id, false from ${personRoles} r
        where r.clinic_id = ${thread.clinicId} and ${inArray(sql`r.role`, ['on-call-clinician', 'clinical-lead'])}
    ) watcher group by person_id`);
  const team = rows.flatMap((row) => (row.is_team && row.person_id !== personId ? [row.person_id] : []));
  return { patientSide, team, all: [...new Set([...patientSide, ...rows.map((row) => row.person_id)])] };
};

/** A question must not be nobody's: without a care team it goes to whoever would be told of a flag. */
export const answeringPeople = async (tx: Tx, thread: ThreadRow, { team }: Watchers): Promise<string[]> =>
  team.length > 0
    ? team
    : peopleToTell(tx, { clinicId: thread.clinicId, patientId: thread.patientId, withOnCall: true });
