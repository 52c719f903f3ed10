import { and, eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { isStaff } from '#shared/access/permissions.ts';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { passkeys } from '../../db/schema/gate.ts';
import type { GuardedContext } from '../../http/route.ts';
import { writeAudit } from '../audit/service.ts';
import { hasAuthenticator } from './authenticators.ts';
import { deviceName } from './devices.ts';
import { tellSignInChanged } from './notices.ts';
import type { Gate } from './one-time-tokens.ts';
import { askRegistration, keepPasskey, verifyRegistration } from './passkeys.ts';
import type { PasskeyAnswer, PasskeyQuestion } from './passkeys.ts';
import { personOf } from './queries.ts';
import { deleteRecoveryCodes } from './recovery-codes.ts';
import { passkeyCount } from './second-factors.ts';
import { countAsGiven, credentialsOf, refuseSecondSetUp, waysInOf } from './ways-in.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

export const askForNewPasskey = async (context: GuardedContext): Promise<PasskeyQuestion> => {
  const { tx, actor, site, now } = context;
  await refuseSecondSetUp(context);
  const { name } = await personOf(tx, actor);
  const { email } = await credentialsOf(site.gate, actor.personId);
  return askRegistration(site, { ...actor, name, email }, now);
};

export const addOwnPasskey = async (
  context: GuardedContext,
  { passkey, name }: { passkey: PasskeyAnswer; name?: string | undefined },
): Promise<WaysIn> => {
  const { tx, actor, browser, site, now } = context;
  await refuseSecondSetUp(context);
  const made = await verifyRegistration(site, actor.personId, passkey, now);
  await writeAudit(tx, actor, { action: 'passkey.added', subjectId: actor.personId }, now);
  await tellSignInChanged(tx, actor, 'passkey-added', now);
  // Named after the device that made it, unless its owner gave a name.
  await keepPasskey(site.gate, actor, made, name ?? deviceName(browser.userAgent).slice(0, 60), now);
  if (!browser.signedIn?.secondFactor) await countAsGiven(context, 'passkey');
  return waysInOf(site.gate, actor.personId, now);
};

/** What must still be there once a passkey is gone. Inside the lock, after the deletion. */
const refuseLastWay = async (gate: Gate, { actor }: GuardedContext): Promise<void> => {
  const left = await passkeyCount(gate, actor.personId);
  if (left > 0) return;
  const { passwordHash } = await credentialsOf(gate, actor.personId);
  if (passwordHash === null) {
    throw new Problem(
      'state-conflict',
      'This is your only way in. Choose a password or add another passkey first.',
    );
  }
  if (await hasAuthenticator(gate, actor.personId)) return;
  if (isStaff(actor.roles)) {
    throw new Problem(
      'state-conflict',
      'This is your only second factor. Add another passkey or an authenticator app first.',
    );
  }
  await deleteRecoveryCodes(gate, actor.personId);
};

export const removeOwnPasskey = async (context: GuardedContext, passkeyId: string): Promise<WaysIn> => {
  const { tx, actor, site, now } = context;
  await writeAudit(tx, actor, { action: 'passkey.removed', subjectId: passkeyId }, now);
  await tellSignInChanged(tx, actor, 'passkey-removed', now);
  await withWaysInLocked(site.gate, actor.personId, async (gate) => {
    const rows = await drizzle({ client: gate, casing: 'snake_case' })
      .delete(passkeys)
      .where(and(eq(passkeys.id, passkeyId), eq(passkeys.personId, actor.personId)))
      .returning({ id: passkeys.id });
    if (rows.length === 0) throw new Problem('not-found');
    await refuseLastWay(gate, context);
  });
  return waysInOf(site.gate, actor.personId, now);
};
