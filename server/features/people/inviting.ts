import { and, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import { invitationLifeMs, type InvitationKind, type InvitationState } from '#shared/people/invitations.ts';
import type { InvitationCard } from '#shared/people/contract.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { notify } from '../../notifications/service.ts';
import { codeHashOf, issueToken, revokeTokens, shortCodeOf } from '../accounts/one-time-tokens.ts';
import { usedTokensAmong } from './gate.ts';

type InvitationRow = typeof invitations.$inferSelect;

/** What has become of an invitation by its own row. */
export const invitationStateAt = (row: InvitationRow, now: Date): InvitationState => {
  if (row.acceptedAt) return 'accepted';
  if (row.revokedAt) return 'revoked';
  return row.expiresAt <= now ? 'expired' : 'open';
};

const toCard = (row: InvitationRow, state: InvitationState): InvitationCard => ({
  id: row.id,
  state,
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
  byEmail: row.byEmail,
  askedAgainAt: row.askedAgainAt?.toISOString() ?? null,
});

/** The one that still stands, of which there is one at most, and then by time. */
export const newestFirst = [
  sql`(${invitations.acceptedAt} is null and ${invitations.revokedAt} is null) desc`,
  desc(invitations.createdAt),
  desc(invitations.id),
];

/** What was sent to that person before opens nothing any more. */
export const revokeInvitations = async (
  tx: Tx,
  site: Site,
  { clinicId, personId }: { clinicId: string; personId: string },
  now: Date,
): Promise<void> => {
  const revoked = await tx
    .update(invitations)
    .set({ revokedAt: now })
    .where(
      and(
        eq(invitations.clinicId, clinicId),
        eq(invitations.personId, personId),
        isNull(invitations.acceptedAt),
        isNull(invitations.revokedAt),
      ),
    )
    .returning({ id: invitations.id });
  if (revoked.length > 0) await revokeTokens(site.gate, personId, 'invitation', now);
};

/**
 * Invites somebody who is on record; the one before is revoked. The token is issued before this transaction
 * commits: without its row, which whoever accepts reads again, it opens nothing.
 */
export const invitePerson = async (
  tx: Tx,
  site: Site,
  actor: { clinicId: string; personId: string },
  { personId, kind, byEmail }: { personId: string; kind: InvitationKind; byEmail: boolean },
  now: Date,
): Promise<InvitationCard> => {
  const { clinicId } = actor;
  // Two invitations at once come one after the other, so that only the later one is open.
  await tx
    .select({ id: people.id })
    .from(people)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)))
    .for('no key update');
  await revokeInvitations(tx, site, { clinicId, personId }, now);
  const expiresAt = new Date(now.getTime() + invitationLifeMs[kind]);
  const rows = await tx
    .insert(invitations)
    .values({ clinicId, personId, kind, byEmail, createdBy: actor.personId, createdAt: now, expiresAt })
    .returning();
  const row = rows[0];
  if (!row) throw new Error('The invitation was not written.');
  const codeHash = codeHashOf(site.tokenSecret, shortCodeOf(site.tokenSecret, row.id));
  await issueToken(
    site.gate,
    { id: row.id, clinicId, personId, kind: 'invitation', expiresAt, codeHash },
    now,
  );
  if (byEmail) {
    // The secret is made when the mail is: the row holds the id alone.
    const told = {
      kind: 'invitation',
      occasion: `invitation:${row.id}`,
      path: `/invitation#${row.id}`,
    } as const;
    await notify(tx, clinicId, [personId], told, now);
  }
  return toCard(row, 'open');
};

/** The newest invitation of each of these people, of any kind or of one. */
export const invitationCardsOf = async (
  tx: Tx,
  site: Site,
  clinicId: string,
  personIds: readonly string[],
  now: Date,
  kind?: InvitationKind,
): Promise<Map<string, InvitationCard>> => {
  if (personIds.length === 0) return new Map();
  const rows = await tx
    .selectDistinctOn([invitations.personId])
    .from(invitations)
    .where(
      and(
        eq(invitations.clinicId, clinicId),
        inArray(invitations.personId, [...personIds]),
        kind ? eq(invitations.kind, kind) : undefined,
      ),
    )
    .orderBy(invitations.personId, ...newestFirst);
  const open = rows.filter((row) => invitationStateAt(row, now) === 'open').map(({ id }) => id);
  // A server that stopped between the gate's commit and ours left a way in: the gate is right.
  const used = await usedTokensAmong(site.gate, open);
  return new Map(
    rows.map((row) => [
      row.personId,
      toCard(row, used.has(row.id) ? 'accepted' : invitationStateAt(row, now)),
    ]),
  );
};
