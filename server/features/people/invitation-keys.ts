import type { z } from 'zod';
import type { lookAtInvitationBody } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PublicContext } from '../../http/route.ts';
import { codeHashOf, idOfLinkToken, tokenByCodeHash, tokenById } from '../accounts/one-time-tokens.ts';
import { admitTry, forgetTries } from '../accounts/throttle.ts';

export type InvitationKey = z.output<typeof lookAtInvitationBody>['invitation'];
type TokenRow = NonNullable<Awaited<ReturnType<typeof tokenById>>>;

/**
 * All wrong codes of everybody together, against whoever guesses from many addresses. It slows down and never
 * shuts: a code has 50 bits, and a patient with a letter in hand must not be kept out by a stranger.
 */
const totalLimits = { freeFailures: 200, firstWaitSeconds: 1, longestWaitSeconds: 10 };
const totalKey = 'letter-codes';

/** Counted before it is looked at, so that many tries at once are no better than many in a row. */
const admit = async (
  { site, now }: PublicContext,
  key: string,
  limits?: typeof totalLimits,
): Promise<void> => {
  const attempt = await admitTry(site.gate, key, now, limits);
  if (attempt.admitted) return;
  throw new Problem('too-many-attempts', undefined, { retryAfter: attempt.retryAfterSeconds });
};

const byCode = async (context: PublicContext, code: string): Promise<TokenRow> => {
  const { site, browser } = context;
  const addressKey = `letter-code:${browser.address}`;
  await admit(context, addressKey);
  await admit(context, totalKey, totalLimits);
  const found = await tokenByCodeHash(site.gate, codeHashOf(site.tokenSecret, code));
  if (found?.kind !== 'invitation') {
    throw new Problem('link-spent', 'No invitation has this code. Look at the letter and type it again.');
  }
  await forgetTries(site.gate, addressKey);
  await forgetTries(site.gate, totalKey);
  return found;
};

/** The token that a link or a letter's code names, whatever has become of it. A link has 256 bits: no counting. */
export const tokenOf = async (context: PublicContext, key: InvitationKey): Promise<TokenRow> => {
  if ('code' in key) return byCode(context, key.code);
  const { site } = context;
  const id = idOfLinkToken(site.tokenSecret, key.token);
  const found = id === null ? null : await tokenById(site.gate, id);
  if (found?.kind !== 'invitation') throw unknownLink();
  return found;
};

export const unknownLink = (): Problem =>
  new Problem(
    'link-spent',
    'This link opens no invitation. Open it again from the mail, or ask the clinic for a new one.',
  );

/** Asking for a new one brings mail to the clinic: not more often from one place than a sign-in may fail. */
export const admitAsking = (context: PublicContext): Promise<void> =>
  admit(context, `ask-again:${context.browser.address}`);
