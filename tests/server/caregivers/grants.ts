import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/node-postgres';
import { caregivers } from '#server/db/schema/caregivers.ts';
import type { TestPatient, TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';

/** Lets somebody look after a patient, with all rights and no last day unless said otherwise. */
export const plantGrant = async (
  { asSuperuser }: TestDatabase,
  patient: TestPatient,
  caregiver: TestPerson,
  changes: Partial<typeof caregivers.$inferInsert> = {},
): Promise<{ caregiverId: string }> => {
  const id = randomUUID();
  await drizzle({ client: asSuperuser, casing: 'snake_case' })
    .insert(caregivers)
    .values({
      clinicId: patient.clinicId,
      id,
      patientId: patient.patientId,
      personId: caregiver.personId,
      calledName: 'Teo Valcourt',
      relationship: 'husband',
      mayCheckIn: true,
      mayMessage: true,
      grantedBy: patient.personId,
      createdAt: new Date(),
      ...changes,
    });
  return { caregiverId: id };
};

/** The header by which a caregiver says for whom a request is. */
export const actingFor = ({ patientId }: TestPatient) => ({ 'x-espalier-patient': patientId });
