import { and, eq, gt, isNull } from 'drizzle-orm';
import type pg from 'pg';
import type { z } from 'zod';
import { isStaff } from '#shared/access/permissions.ts';
import type { Me } from '#shared/accounts/contract.ts';
import type { acceptInvitationBody } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { people } from '../../db/schema/people.ts';
import { withTx, type Tx } from '../../db/with-tx.ts';
import type { PublicContext } from '../../http/route.ts';
import { deviceName } from '../accounts/devices.ts';
import { actorEntering } from '../accounts/entering.ts';
import { tellSignInChanged } from '../accounts/notices.ts';
import { useToken } from '../accounts/one-time-tokens.ts';
import { writePassword } from '../accounts/own-password.ts';
import { keepPasskey, verifyRegistration, type NewPasskey } from '../accounts/passkeys.ts';
import { refuseCommonPassword } from '../accounts/password-policy.ts';
import { hashPassword } from '../accounts/passwords.ts';
import { loadPersonActor } from '../accounts/queries.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { beginSession } from '../accounts/starting.ts';
import { withWaysInLocked } from '../accounts/ways-in-lock.ts';
import { writeAudit } from '../audit/service.ts';
import { endSessions } from './access.ts';
import { hasWayIn, keepCredentials } from './gate.ts';
import { openInvitation, spent } from './looking.ts';

type Accepting = z.output<typeof acceptInvitationBody>;
type Open = Awaited<ReturnType<typeof openInvitation>>;
/** What was chosen, ready to be kept. */
type NewWay = { passwordHash: string } | { passkey: NewPasskey };

/** Checked and hashed before anything is written: a refusal leaves the invitation open. */
const prepare = async (
  { site, now }: PublicContext,
  { person }: Open,
  way: Accepting['way'],
): Promise<NewWay> => {
  if (way.kind === 'passkey') {
    return { passkey: await verifyRegistration(site, person.personId, way.passkey, now) };
  }
  refuseCommonPassword(way.password, person);
  return { passwordHash: await hashPassword(way.password) };
};

/**
 * Staff who have a way in keep it: a letter may be opened by others of the clinic, and must not let anybody past a
 * colleague's second factor. Patients and caregivers may come by a new invitation when they lost theirs.
 */
const refuseStaffWithWayIn = (actor: PersonActor, hadWayIn: boolean): void => {
  if (!hadWayIn || !isStaff(actor.roles)) return;
  throw new Problem('state-conflict', 'You have an account here already. Sign in with it.');
};

const whoAccepts = async ({ pools, site }: PublicContext, { person }: Open) => {
  const actor = await actorEntering(pools, person);
  if (!actor) {
    throw new Problem(
      'state-conflict',
      'The clinic has yet to confirm what you may do here. The invitation stays open; try again later.',
    );
  }
  const hadWayIn = await hasWayIn(site.gate, person.personId);
  refuseStaffWithWayIn(actor, hadWayIn);
  return { actor, hadWayIn };
};

/** The gate's part, all or nothing: the token is used by one, and their way in is there. */
const openTheWay = (
  { site, browser, now }: PublicContext,
  { id, person }: Open,
  email: string,
  way: NewWay,
): Promise<void> =>
  withWaysInLocked(site.gate, person.personId, async (gate: pg.PoolClient) => {
    if (!(await useToken(gate, id, 'invitation', now))) throw spent('used');
    await keepCredentials(gate, { ...person, email });
    if ('passwordHash' in way) await writePassword(gate, person.personId, way.passwordHash, now);
    else await keepPasskey(gate, person, way.passkey, deviceName(browser.userAgent).slice(0, 60), now);
  });

/** Takes the invitation's row, once. Whoever deactivates or invites this person anew comes before or after. */
const takeInvitation = async (tx: Tx, { id, person }: Open, now: Date) => {
  const { clinicId, personId } = person;
  const [row] = await tx
    .select({ email: people.email })
    .from(people)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId), eq(people.active, true)))
    .for('share');
  if (!row) throw spent('revoked');
  const taken = await tx
    .update(invitations)
    .set({ acceptedAt: now })
    .where(
      and(
        eq(invitations.clinicId, clinicId),
        eq(invitations.id, id),
        isNull(invitations.acceptedAt),
        isNull(invitations.revokedAt),
        gt(invitations.expiresAt, now),
      ),
    )
    .returning({ id: invitations.id });
  if (taken.length === 0) throw spent('used');
  return row;
};

/** Makes the first way in and signs in. Of any number at once one comes in, and the others are told. */
export const accept = async (
  context: PublicContext,
  { invitation, way, staySignedIn }: Accepting,
): Promise<Me> => {
  const { pools, site, now } = context;
  const open = await openInvitation(context, invitation);
  const { actor, hadWayIn } = await whoAccepts(context, open);
  const { clinicId, personId } = actor;
  const newWay = await prepare(context, open, way);
  await withTx(pools.app, actor, async (tx) => {
    const { email } = await takeInvitation(tx, open, now);
    const standing = await loadPersonActor(tx, actor);
    if (!standing) throw spent('revoked');
    refuseStaffWithWayIn(standing, hadWayIn);
    await writeAudit(tx, actor, { action: 'invitation.accepted', subjectId: open.id }, now);
    if (hadWayIn) {
      await tellSignInChanged(tx, actor, way.kind === 'password' ? 'password' : 'passkey-added', now);
      if (way.kind === 'password') await endSessions(tx, site, { clinicId, personId }, now);
    }
    // Last, since what the gate has committed stays.
    await openTheWay(context, open, normaliseEmail(email), newWay);
  });
  const secondFactor = way.kind === 'passkey' ? 'passkey' : null;
  return beginSession(context, actor, { staySignedIn, secondFactor });
};
