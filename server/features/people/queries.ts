import { and, eq, inArray, ne, notInArray, or } from 'drizzle-orm';
import type { Role } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/** Whoever holds a role of the clinic's staff, or was invited to and has none yet. A patient may be both. */
const worksHere = (tx: Tx, clinicId: string) =>
  and(
    eq(people.clinicId, clinicId),
    or(
      inArray(
        people.id,
        tx
          .select({ personId: personRoles.personId })
          .from(personRoles)
          .where(
            and(eq(personRoles.clinicId, clinicId), notInArray(personRoles.role, ['patient', 'caregiver'])),
          ),
      ),
      inArray(
        people.id,
        tx
          .select({ personId: invitations.personId })
          .from(invitations)
          .where(and(eq(invitations.clinicId, clinicId), eq(invitations.kind, 'staff'))),
      ),
    ),
  );

/** Everybody who works for the clinic, or one of them. */
export const staffRows = (tx: Tx, clinicId: string, personId?: string) =>
  tx
    .select()
    .from(people)
    .where(and(worksHere(tx, clinicId), personId === undefined ? undefined : eq(people.id, personId)));

export const rolesOf = async (
  tx: Tx,
  clinicId: string,
  personIds: readonly string[],
): Promise<Map<string, Role[]>> => {
  const held = new Map<string, Role[]>(personIds.map((personId) => [personId, []]));
  if (personIds.length === 0) return held;
  const rows = await tx
    .select({ personId: personRoles.personId, role: personRoles.role })
    .from(personRoles)
    .where(and(eq(personRoles.clinicId, clinicId), inArray(personRoles.personId, [...personIds])));
  for (const { personId, role } of rows) held.get(personId)?.push(role);
  return held;
};

/** The door of a member of staff: somebody of this clinic who is no mere patient or caregiver. */
export const staffMemberOf = async (tx: Tx, clinicId: string, personId: string) => {
  const [row] = await staffRows(tx, clinicId, personId);
  if (!row) throw new Problem('not-found');
  const roles = (await rolesOf(tx, clinicId, [personId])).get(personId) ?? [];
  return { ...row, roles };
};

/** Active people of the clinic who hold one of these roles. */
export const activeHolders = async (
  tx: Tx,
  clinicId: string,
  roles: readonly Role[],
  except: readonly string[] = [],
): Promise<string[]> => {
  const rows = await tx
    .selectDistinct({ id: people.id })
    .from(people)
    .innerJoin(
      personRoles,
      and(eq(personRoles.clinicId, people.clinicId), eq(personRoles.personId, people.id)),
    )
    .where(
      and(
        eq(people.clinicId, clinicId),
        eq(people.active, true),
        inArray(personRoles.role, [...roles]),
        ...except.map((personId) => ne(people.id, personId)),
      ),
    );
  return rows.map(({ id }) => id);
};
