import { and, eq, isNull } from 'drizzle-orm';
import type { lookAtInvitation } from '#shared/accounts/ways-in-contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { people } from '../../db/schema/people.ts';
import { withTx, type Tx } from '../../db/with-tx.ts';
import type { PublicContext } from '../../http/route.ts';
import { notify } from '../../notifications/service.ts';
import type { tokenById } from '../accounts/one-time-tokens.ts';
import { askRegistration, type PasskeyQuestion } from '../accounts/passkeys.ts';
import { writeAudit } from '../audit/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import { admitAsking, tokenOf, unknownLink, type InvitationKey } from './invitation-keys.ts';
import { invitationStateAt, newestFirst } from './inviting.ts';
import { placeToTell } from './people-to-tell.ts';

type TokenRow = NonNullable<Awaited<ReturnType<typeof tokenById>>>;
type Look = OutputOf<typeof lookAtInvitation>;

const spentWords: Record<Exclude<Look['state'], 'open'>, string> = {
  used: 'This invitation has been used already. Sign in, or ask the clinic for a new one.',
  expired: 'This invitation has expired. Ask the clinic for a new one.',
  revoked: 'This invitation was replaced or taken back. Use the newest one, or ask the clinic for a new one.',
};

export const spent = (state: Exclude<Look['state'], 'open'>): Problem =>
  new Problem('link-spent', spentWords[state]);

/** The invitation behind a token, with its person. A token whose row was never committed opens nothing. */
const invitationBehind = async (tx: Tx, token: TokenRow, now: Date) => {
  const { clinicId } = token;
  const [found] = await tx
    .select({ invitation: invitations, person: people })
    .from(invitations)
    .innerJoin(people, and(eq(people.clinicId, clinicId), eq(people.id, invitations.personId)))
    .where(and(eq(invitations.clinicId, clinicId), eq(invitations.id, token.id)));
  if (!found) throw unknownLink();
  const { invitation, person } = found;
  const own = invitationStateAt(invitation, now);
  let state: Look['state'] = own === 'accepted' ? 'used' : own;
  if (token.usedAt) state = 'used';
  else if (token.revokedAt || !person.active) state = 'revoked';
  return { invitation, person, state };
};

const asLink = ({ clinicId, id }: TokenRow) => ({ kind: 'link', clinicId, linkId: id }) as const;

/** What an invitation opens. Nothing is used up: mail scanners follow links too. */
export const look = async (context: PublicContext, key: InvitationKey): Promise<Look> => {
  const token = await tokenOf(context, key);
  const { pools, now } = context;
  return withTx(pools.app, asLink(token), async (tx) => {
    const { invitation, person, state } = await invitationBehind(tx, token, now);
    const { name, phone, emergencyNumber } = await clinicOf(tx, token.clinicId);
    const isOpen = state === 'open';
    return {
      state,
      kind: invitation.kind,
      clinic: { name, phone, emergencyNumber },
      firstName: isOpen ? (person.name.split(/\s+/)[0] ?? null) : null,
      email: isOpen ? person.email : null,
      expiresAt: invitation.expiresAt.toISOString(),
    };
  });
};

/** The open invitation that a key names, with whom it is for; refused with the reason where it is not open. */
export const openInvitation = async (context: PublicContext, key: InvitationKey) => {
  const token = await tokenOf(context, key);
  const { pools, now } = context;
  const { invitation, person, state } = await withTx(pools.app, asLink(token), (tx) =>
    invitationBehind(tx, token, now),
  );
  if (state !== 'open') throw spent(state);
  const { clinicId, id: personId, name, email } = person;
  return { id: invitation.id, person: { clinicId, personId, name, email } };
};

export const askFirstPasskey = async (
  context: PublicContext,
  key: InvitationKey,
): Promise<PasskeyQuestion> => {
  const { person } = await openInvitation(context, key);
  return askRegistration(context.site, person, context.now);
};

/**
 * Somebody came too late: the clinic is told, once for the newest invitation of that person. The answer is the
 * same whatever is found, and an open invitation needs no new one.
 */
export const askAgain = async (context: PublicContext, key: InvitationKey): Promise<void> => {
  await admitAsking(context);
  const token = await tokenOf(context, key);
  const { pools, now } = context;
  const { clinicId, personId } = token;
  await withTx(pools.app, asLink(token), async (tx) => {
    const { person, state } = await invitationBehind(tx, token, now);
    if (state === 'open' || !person.active) return;
    const [newest] = await tx
      .select()
      .from(invitations)
      .where(and(eq(invitations.clinicId, clinicId), eq(invitations.personId, personId)))
      .orderBy(...newestFirst)
      .limit(1);
    if (!newest) throw unknownLink();
    const asked = await tx
      .update(invitations)
      .set({ askedAgainAt: now })
      .where(
        and(
          eq(invitations.clinicId, clinicId),
          eq(invitations.id, newest.id),
          isNull(invitations.askedAgainAt),
        ),
      )
      .returning({ id: invitations.id });
    if (asked.length === 0) return;
    await writeAudit(tx, asLink(token), { action: 'invitation.asked-again', subjectId: personId }, now);
    const { personIds, path } = await placeToTell(tx, clinicId, personId, newest.kind);
    const occasion = { kind: 'invitation-asked', occasion: `invitation-asked:${newest.id}`, path } as const;
    await notify(tx, clinicId, personIds, occasion, now);
  });
};
