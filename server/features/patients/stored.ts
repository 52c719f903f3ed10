import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { PersonActor } from '../../db/actor.ts';
import { patients } from '../../db/schema/patients.ts';
import type { Tx } from '../../db/with-tx.ts';
import { chartOf, type Chart } from '../plans/queries.ts';
import { lineOf, teamOf } from './queries.ts';

type Team = Awaited<ReturnType<typeof teamOf>>;

/** The fields that the clinic fills in, as they are stored; the team in one order. */
export const storedFields = ({ patient, name, card }: Chart, email: string, team: Team) => ({
  identity: {
    name,
    email,
    chartNumber: patient.chartNumber,
    birthDate: patient.birthDate,
    phone: patient.phone,
    address: patient.address,
    timeZone: patient.timeZone,
    language: patient.language,
    dominantHand: patient.dominantHand,
    emergencyContact: patient.emergencyContact,
    bloodThinner: patient.bloodThinner,
    allergies: patient.allergies,
    mainMedicines: patient.mainMedicines,
    equipmentAtHome: patient.equipmentAtHome,
  },
  operation: {
    procedure: card.procedure,
    arm: card.arm,
    surgeryDate: card.surgeryDate,
    surgeon: card.surgeon,
    approach: card.approach,
    subscapularis: card.subscapularis,
    biceps: card.biceps,
    tuberosity: card.tuberosity,
    limits: card.limits,
    block: card.block,
    dressingUntilDay: card.dressingUntilDay,
  },
  careTeam: team
    .map(({ personId, isLead }) => ({ personId, isLead }))
    .sort((a, b) => a.personId.localeCompare(b.personId)),
});

type StoredFields = ReturnType<typeof storedFields>;

/** Names what is stored: another value in any field is another revision. The fields always come in one order. */
export const revisionOf = (fields: StoredFields): string =>
  createHash('sha256').update(JSON.stringify(fields)).digest('base64url');

/**
 * What is stored now, and stays so until this transaction ends: others who change the record wait. What only
 * points at the patient, as a check-in that arrives, does not.
 */
export const lockStoredFields = async (
  tx: Tx,
  actor: PersonActor,
  patientId: string,
): Promise<StoredFields> => {
  const { clinicId } = actor;
  await tx
    .select({ id: patients.id })
    .from(patients)
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)))
    .for('no key update');
  const { email } = await lineOf(tx, actor, patientId);
  return storedFields(await chartOf(tx, clinicId, patientId), email, await teamOf(tx, clinicId, patientId));
};
