import { and, eq, inArray } from 'drizzle-orm';
import { roles as allRoles } from '#shared/access/permissions.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { twoPersonActs } from '../../db/schema/invitations.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { describeActs } from './acts-view.ts';
import { signInFactsOf } from './gate.ts';
import { invitationCardsOf } from './inviting.ts';
import { rolesOf, staffRows } from './queries.ts';

/** The clinic's people as its administrators see them, by name; all, or one. */
const describe = async (
  tx: Tx,
  site: Site,
  clinicId: string,
  now: Date,
  personId?: string,
): Promise<StaffPerson[]> => {
  const rows = await staffRows(tx, clinicId, personId);
  const ids = rows.map(({ id }) => id);
  if (ids.length === 0) return [];
  const held = await rolesOf(tx, clinicId, ids);
  const cards = await invitationCardsOf(tx, site, clinicId, ids, now);
  const waiting = await describeActs(
    tx,
    clinicId,
    and(eq(twoPersonActs.state, 'waiting'), inArray(twoPersonActs.personId, ids)),
  );
  const { withSecondFactor, lastActivity } = await signInFactsOf(site.gate, ids);
  const inOrder = new Intl.Collator('en');
  return rows
    .toSorted((a, b) => inOrder.compare(a.name, b.name))
    .map((row) => ({
      id: row.id,
      name: row.name,
      credential: row.credential,
      email: row.email,
      phone: row.phone,
      timeZone: row.timeZone,
      roles: allRoles.filter((role) => held.get(row.id)?.includes(role)),
      active: row.active,
      firstSignedInAt: row.firstSignedInAt?.toISOString() ?? null,
      lastActivityAt: lastActivity.get(row.id)?.toISOString() ?? null,
      hasSecondFactor: withSecondFactor.has(row.id),
      emailBounced: row.emailBouncedAt !== null,
      invitation: cards.get(row.id) ?? null,
      waiting: waiting.filter(({ person }) => person.id === row.id),
    }));
};

export const describeStaff = (tx: Tx, site: Site, clinicId: string, now: Date): Promise<StaffPerson[]> =>
  describe(tx, site, clinicId, now);

export const describeOne = async (
  tx: Tx,
  site: Site,
  clinicId: string,
  personId: string,
  now: Date,
): Promise<StaffPerson> => {
  const [person] = await describe(tx, site, clinicId, now, personId);
  if (!person) throw new Error('A member of staff who was just there is gone.');
  return person;
};
