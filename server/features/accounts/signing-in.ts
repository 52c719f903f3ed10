import type { z } from 'zod';
import { isStaff } from '#shared/access/permissions.ts';
import type {
  giveSecondFactorBody,
  Me,
  signInBody,
  signInByPasskey,
  SignInStep,
} from '#shared/accounts/contract.ts';
import type { InputOf } from '#shared/http/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PublicContext } from '../../http/route.ts';
import { actorEntering } from './entering.ts';
import { askAssertion, verifyAssertion } from './passkey-assertions.ts';
import type { PasskeyQuestion } from './passkeys.ts';
import {
  beginPendingSignIn,
  countPendingTry,
  finishPendingSignIn,
  pendingSignIn,
} from './pending-sign-ins.ts';
import { requireSecondFactor, secondFactorWays } from './second-factors.ts';
import { beginSession } from './starting.ts';

/** Staff with a second factor are half in; staff without one are let in to set one up, and to nothing else. */
export const signInWithPassword = async (
  context: PublicContext,
  { email, password, staySignedIn }: z.output<typeof signInBody>,
): Promise<SignInStep> => {
  const { browser, pools, site, now } = context;
  const found = await browser.authenticate(email, password);
  const actor = found && (await actorEntering(pools, found));
  if (!actor) throw new Problem('wrong-sign-in');
  const ways = isStaff(actor.roles) ? await secondFactorWays(site.gate, actor.personId) : [];
  if (ways.length > 0) {
    return { next: 'second-factor', pendingId: await beginPendingSignIn(site.gate, actor, now), ways };
  }
  return { next: 'none', me: await beginSession(context, actor, { staySignedIn, secondFactor: null }) };
};

export const askForPendingPasskey = async (
  { site, now }: PublicContext,
  pendingId: string,
): Promise<PasskeyQuestion> => {
  const { personId } = await pendingSignIn(site.gate, pendingId, now);
  return askAssertion(site, { purpose: 'second-factor', personId }, now);
};

export const finishWithSecondFactor = async (
  context: PublicContext,
  { pendingId, answer }: z.output<typeof giveSecondFactorBody>,
): Promise<Me> => {
  const { pools, site, now } = context;
  const { personId } = await countPendingTry(site.gate, pendingId, now);
  await requireSecondFactor(site, { purpose: 'second-factor', personId }, answer, now);
  const person = await finishPendingSignIn(site.gate, pendingId);
  if (!(await actorEntering(pools, person))) throw new Problem('wrong-sign-in');
  return beginSession(context, person, { staySignedIn: false, secondFactor: answer.way });
};

/** The passkey asked its owner for a finger, a face or a PIN: what they have and what they are, in one. */
export const enterByPasskey = async (
  context: PublicContext,
  { passkey, staySignedIn }: InputOf<typeof signInByPasskey>['body'],
): Promise<Me> => {
  const { pools, site, now } = context;
  const person = await verifyAssertion(site, { purpose: 'sign-in', personId: null }, passkey, now);
  if (!person || !(await actorEntering(pools, person))) throw new Problem('wrong-code');
  return beginSession(context, person, { staySignedIn, secondFactor: 'passkey' });
};
