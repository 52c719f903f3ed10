import { and, eq, inArray, or } from 'drizzle-orm';
import { careTeamMembers } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/** Who is told of a flag: the patient's care team, and from urgent up everybody on call. */
export const peopleToTell = async (
  tx: Tx,
  { clinicId, patientId, withOnCall }: { clinicId: string; patientId: string; withOnCall: boolean },
): Promise<string[]> => {
  const onTeam = tx
    .select({ personId: careTeamMembers.personId })
    .from(careTeamMembers)
    .where(and(eq(careTeamMembers.clinicId, clinicId), eq(careTeamMembers.patientId, patientId)));
  const onCall = tx
    .select({ personId: personRoles.personId })
    .from(personRoles)
    .where(and(eq(personRoles.clinicId, clinicId), eq(personRoles.role, 'on-call-clinician')));
  const rows = await tx
    .select({ id: people.id })
    .from(people)
    .where(
      and(
        eq(people.clinicId, clinicId),
        eq(people.active, true),
        withOnCall ? or(inArray(people.id, onTeam), inArray(people.id, onCall)) : inArray(people.id, onTeam),
      ),
    );
  return rows.map(({ id }) => id);
};
