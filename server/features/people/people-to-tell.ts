import { and, desc, eq } from 'drizzle-orm';
import type { InvitationKind } from '#shared/people/invitations.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { careTeamMembers, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { activeHolders } from './queries.ts';

/** The record that somebody was invited to: their own, or the last one they were to look after. */
const recordOf = async (
  tx: Tx,
  clinicId: string,
  personId: string,
  kind: InvitationKind,
): Promise<string | null> => {
  if (kind === 'patient') {
    const [own] = await tx
      .select({ id: patients.id })
      .from(patients)
      .where(and(eq(patients.clinicId, clinicId), eq(patients.personId, personId)));
    return own?.id ?? null;
  }
  if (kind === 'staff') return null;
  const [care] = await tx
    .select({ id: caregivers.patientId })
    .from(caregivers)
    .where(and(eq(caregivers.clinicId, clinicId), eq(caregivers.personId, personId)))
    .orderBy(desc(caregivers.createdAt))
    .limit(1);
  return care?.id ?? null;
};

/** Who can send a new invitation, and where: the administrators, and for a record its care team as well. */
export const placeToTell = async (
  tx: Tx,
  clinicId: string,
  personId: string,
  kind: InvitationKind,
): Promise<{ personIds: string[]; path: string }> => {
  const administrators = await activeHolders(tx, clinicId, ['administrator']);
  const patientId = await recordOf(tx, clinicId, personId, kind);
  if (patientId === null) return { personIds: administrators, path: `/clinic/people/${personId}` };
  const team = await tx
    .select({ id: people.id })
    .from(careTeamMembers)
    .innerJoin(
      people,
      and(
        eq(people.clinicId, careTeamMembers.clinicId),
        eq(people.id, careTeamMembers.personId),
        eq(people.active, true),
      ),
    )
    .where(and(eq(careTeamMembers.clinicId, clinicId), eq(careTeamMembers.patientId, patientId)));
  return { personIds: [...administrators, ...team.map(({ id }) => id)], path: `/caseload/${patientId}` };
};
