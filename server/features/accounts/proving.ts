import type { z } from 'zod';
import type { proveBody } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { GuardedContext } from '../../http/route.ts';
import { writeAudit } from '../audit/service.ts';
import { askAssertion } from './passkey-assertions.ts';
import type { PasskeyQuestion } from './passkeys.ts';
import { requireSecondFactor } from './second-factors.ts';
import { checkPassword } from './service.ts';
import { credentialsOf } from './ways-in.ts';

export const askForProof = ({ actor, site, now }: GuardedContext): Promise<PasskeyQuestion> =>
  askAssertion(site, { purpose: 'prove', personId: actor.personId }, now);

/** Wrong ones count like those of a sign-in, so that an open session is no way to guess. */
const requirePassword = async ({ actor, site, now }: GuardedContext, password: string): Promise<void> => {
  const { email } = await credentialsOf(site.gate, actor.personId);
  const found = await checkPassword(site.gate, { email, password }, now);
  if (found?.personId !== actor.personId) throw new Problem('wrong-code', 'That password is not right.');
};

/** The person proves again who they are. A passkey or a code counts as the second factor of the session too. */
export const proveAgain = async (
  context: GuardedContext,
  answer: z.output<typeof proveBody>,
): Promise<void> => {
  const { tx, actor, browser, site, now } = context;
  const { personId } = actor;
  await writeAudit(tx, actor, { action: 'session.proven', detail: { way: answer.way } }, now);
  if (answer.way === 'password') await requirePassword(context, answer.password);
  else await requireSecondFactor(site, { purpose: 'prove', personId }, answer, now);
  const proven = await browser.prove(answer.way === 'password' ? undefined : answer.way);
  if (!proven) throw new Problem('not-signed-in');
};
