import { and, eq, inArray, or, type SQL } from 'drizzle-orm';
import { clinicianRoles, type Role } from '#shared/access/permissions.ts';
import { careTeamMembers } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/**
 * Who is told of a flag: the patient's care team, and from urgent up everybody on call. Where that is nobody, as
 * when the only therapist has left, every clinician of the clinic: a flag must not be nobody's.
 */
export const peopleToTell = async (
  tx: Tx,
  { clinicId, patientId, withOnCall }: { clinicId: string; patientId: string; withOnCall: boolean },
): Promise<string[]> => {
  const onTeam = tx
    .select({ personId: careTeamMembers.personId })
    .from(careTeamMembers)
    .where(and(eq(careTeamMembers.clinicId, clinicId), eq(careTeamMembers.patientId, patientId)));
  const holding = (roles: readonly Role[]) =>
    tx
      .select({ personId: personRoles.personId })
      .from(personRoles)
      .where(and(eq(personRoles.clinicId, clinicId), inArray(personRoles.role, [...roles])));
  const active = async (which: SQL | undefined): Promise<string[]> => {
    const rows = await tx
      .select({ id: people.id })
      .from(people)
      .where(and(eq(people.clinicId, clinicId), eq(people.active, true), which));
    return rows.map(({ id }) => id);
  };
  const ofTeam = inArray(people.id, onTeam);
  const answering = await active(
    withOnCall ? or(ofTeam, inArray(people.id, holding(['on-call-clinician']))) : ofTeam,
  );
  return answering.length > 0 ? answering : active(inArray(people.id, holding(clinicianRoles)));
};
