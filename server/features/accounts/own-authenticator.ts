import QRCode from 'qrcode';
import { isStaff } from '#shared/access/permissions.ts';
import type { startAuthenticator, WaysIn } from '#shared/accounts/ways-in-contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { GuardedContext } from '../../http/route.ts';
import { writeAudit } from '../audit/service.ts';
import { beginAuthenticator, confirmAuthenticatorOf, deleteAuthenticator } from './authenticators.ts';
import { tellSignInChanged } from './notices.ts';
import { deleteRecoveryCodes, replaceRecoveryCodes } from './recovery-codes.ts';
import {
  admitSecondFactorTry,
  forgetSecondFactorTries,
  passkeyCount,
  secondFactorWays,
} from './second-factors.ts';
import { totpUri } from './totp.ts';
import { countAsGiven, credentialsOf, refuseSecondSetUp, waysInOf } from './ways-in.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

const svgAddress = (svg: string): string =>
  `data:image/svg+xml;base64,${Buffer.from(svg).toString('base64')}`;

export const startOwnAuthenticator = async (
  context: GuardedContext,
): Promise<OutputOf<typeof startAuthenticator>> => {
  const { tx, actor, site, now } = context;
  await refuseSecondSetUp(context);
  const { email } = await credentialsOf(site.gate, actor.personId);
  await writeAudit(tx, actor, { action: 'authenticator.started', subjectId: actor.personId }, now);
  const secret = await beginAuthenticator(site, actor);
  const uri = totpUri(secret, email);
  return { secret, uri, picture: svgAddress(await QRCode.toString(uri, { type: 'svg', margin: 4 })) };
};

/** The answer is the only time that the recovery codes can be read. */
export const confirmOwnAuthenticator = async (context: GuardedContext, code: string): Promise<string[]> => {
  const { tx, actor, browser, site, now } = context;
  const { personId } = actor;
  await refuseSecondSetUp(context);
  await admitSecondFactorTry(site, personId, now);
  await writeAudit(tx, actor, { action: 'authenticator.confirmed', subjectId: personId }, now);
  await tellSignInChanged(tx, actor, 'authenticator-added', now);
  const confirmation = await confirmAuthenticatorOf(site, personId, code, now);
  if (confirmation === 'wrong')
    throw new Problem('wrong-code', 'That code is not right. Enter the newest one.');
  await forgetSecondFactorTries(site, personId);
  if (confirmation === 'nothing-waits') {
    throw new Problem('state-conflict', 'No authenticator app waits to be confirmed. Please begin again.');
  }
  if (!browser.signedIn?.secondFactor) await countAsGiven(context, 'authenticator');
  return replaceRecoveryCodes(site, actor);
};

export const removeOwnAuthenticator = async ({ tx, actor, site, now }: GuardedContext): Promise<WaysIn> => {
  const { personId } = actor;
  await writeAudit(tx, actor, { action: 'authenticator.removed', subjectId: personId }, now);
  await tellSignInChanged(tx, actor, 'authenticator-removed', now);
  await withWaysInLocked(site.gate, personId, async (gate) => {
    if (!(await deleteAuthenticator(gate, personId))) {
      throw new Problem('state-conflict', 'There is no authenticator app to remove.');
    }
    if ((await passkeyCount(gate, personId)) > 0) return;
    if (isStaff(actor.roles)) {
      throw new Problem('state-conflict', 'This is your only second factor. Add a passkey first.');
    }
    await deleteRecoveryCodes(gate, personId);
  });
  return waysInOf(site.gate, personId, now);
};

export const renewRecoveryCodes = async ({ tx, actor, site, now }: GuardedContext): Promise<string[]> => {
  if ((await secondFactorWays(site.gate, actor.personId)).length === 0) {
    throw new Problem(
      'state-conflict',
      'Recovery codes stand in for an authenticator app or a passkey. Add one first.',
    );
  }
  await writeAudit(tx, actor, { action: 'recovery-codes.renewed', subjectId: actor.personId }, now);
  await tellSignInChanged(tx, actor, 'recovery-codes', now);
  return replaceRecoveryCodes(site, actor);
};
