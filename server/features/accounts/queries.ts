import { and, eq } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Role } from '#shared/access/permissions.ts';
import type { PersonActor } from '../../db/actor.ts';
import { operationCards, patients } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/** The person of a session with the roles they hold now; null once they are no longer active. */
export const loadPersonActor = async (
  tx: Tx,
  { clinicId, personId }: { clinicId: string; personId: string },
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
  return { kind: 'person', clinicId, personId, roles, patientId: first.patientId };
};

export const personOf = async (tx: Tx, actor: PersonActor) => {
  const rows = await tx
    .select({ name: people.name, arm: operationCards.arm })
    .from(people)
    .leftJoin(patients, and(eq(patients.clinicId, people.clinicId), eq(patients.personId, people.id)))
    .leftJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .where(and(eq(people.clinicId, actor.clinicId), eq(people.id, actor.personId)));
  const person = rows[0];
  if (!person) throw new Error('An actor without a person.');
  return person;
};
