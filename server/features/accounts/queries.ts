import { and, eq, gte, isNull, or, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Role } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { operationCards, patients, patientStateChanges } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/** A grant of care that holds at an instant, judged by the patient's own calendar. */
const holdsAt = (now: Date) =>
  and(
    isNull(caregivers.endedAt),
    or(
      isNull(caregivers.untilDate),
      gte(
        caregivers.untilDate,
        sql`(${now.toISOString()}::timestamptz at time zone ${patients.timeZone})::date`,
      ),
    ),
  );

/** Whose records somebody may act on as a caregiver now. */
export const careGrants = (
  tx: Tx,
  { clinicId, personId }: { clinicId: string; personId: string },
  now: Date,
) =>
  tx
    .select({
      caregiverId: caregivers.id,
      patientId: caregivers.patientId,
      mayCheckIn: caregivers.mayCheckIn,
      mayMessage: caregivers.mayMessage,
      until: caregivers.untilDate,
      name: people.name,
    })
    .from(caregivers)
    .innerJoin(
      patients,
      and(eq(patients.clinicId, caregivers.clinicId), eq(patients.id, caregivers.patientId)),
    )
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .where(and(eq(caregivers.clinicId, clinicId), eq(caregivers.personId, personId), holdsAt(now)))
    .orderBy(sql`${people.name} collate "en-x-icu"`);

/**
 * The person of a session with the roles they hold now; null once they are no longer active. With `caresFor` the
 * request is about that patient's record: their own, one they look after now, or none at all, which looks like a
 * record that is not there.
 */
export const loadPersonActor = async (
  tx: Tx,
  { clinicId, personId }: { clinicId: string; personId: string },
  { caresFor, now }: { caresFor?: string | undefined; now?: Date } = {},
): Promise<PersonActor | null> => {
  const ownRecord = alias(patients, 'own_record');
  const rows = await tx
    .select({ role: personRoles.role, patientId: ownRecord.id })
    .from(people)
    .innerJoin(
      personRoles,
      and(eq(personRoles.clinicId, people.clinicId), eq(personRoles.personId, people.id)),
    )
    .leftJoin(ownRecord, and(eq(ownRecord.clinicId, people.clinicId), eq(ownRecord.personId, people.id)))
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId), eq(people.active, true)));
  const first = rows[0];
  if (!first) return null;
  const roles: Role[] = rows.map(({ role }) => role);
  const self = { kind: 'person', clinicId, personId, roles } as const;
  if (caresFor === undefined || now === undefined || caresFor === first.patientId) {
    return { ...self, patientId: first.patientId, caring: null };
  }
  const grants = await careGrants(tx, { clinicId, personId }, now);
  const grant = grants.find(({ patientId }) => patientId === caresFor);
  if (!grant) throw new Problem('not-found');
  const { caregiverId, mayCheckIn, mayMessage } = grant;
  return { ...self, patientId: grant.patientId, caring: { caregiverId, mayCheckIn, mayMessage } };
};

/** Every record whose hints reach this person: their own and those they look after. */
export const recordsOf = async (tx: Tx, actor: PersonActor, now: Date): Promise<string[]> => {
  const grants = await careGrants(tx, actor, now);
  const cared = grants.map(({ patientId }) => patientId);
  return actor.patientId ? [actor.patientId, ...cared] : cared;
};

export const personOf = async (tx: Tx, actor: { clinicId: string; personId: string }) => {
  const rows = await tx
    .select({ name: people.name, email: people.email })
    .from(people)
    .where(and(eq(people.clinicId, actor.clinicId), eq(people.id, actor.personId)));
  const person = rows[0];
  if (!person) throw new Error('An actor without a person.');
  return person;
};

/** What the screens need of a record that somebody acts on. */
export const recordCardRow = async (tx: Tx, clinicId: string, patientId: string) => {
  const rows = await tx
    .select({
      id: patients.id,
      state: patients.state,
      timeZone: patients.timeZone,
      arm: operationCards.arm,
      surgeryDate: operationCards.surgeryDate,
      stateSince: sql<Date | null>`(
        select max(c.at) from ${patientStateChanges} c
        where c.clinic_id = ${patients.clinicId} and c.patient_id = ${patients.id})`.mapWith(
        (value: unknown) => (typeof value === 'string' ? new Date(value) : (value as Date | null)),
      ),
    })
    .from(patients)
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  return rows[0] ?? null;
};
