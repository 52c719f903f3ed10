import { randomUUID } from 'node:crypto';
import { setTimeout as wait } from 'node:timers/promises';
import { eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { Problem } from '#shared/problems/problems.ts';
import { credentials } from '../../db/schema/gate.ts';
import { withTx } from '../../db/with-tx.ts';
import type { PublicContext } from '../../http/route.ts';
import { revokeSessionsOf } from '../../http/sessions.ts';
import { notify } from '../../notifications/service.ts';
import { writeAudit } from '../audit/service.ts';
import { actorEntering } from './entering.ts';
import { secondsUntilNextMail } from './mail-limit.ts';
import { tellSignInChanged } from './notices.ts';
import { idOfLinkToken, issueToken, tokenById, useToken } from './one-time-tokens.ts';
import { writePassword } from './own-password.ts';
import { refuseCommonPassword } from './password-policy.ts';
import { hashPassword } from './passwords.ts';
import { personOf } from './queries.ts';
import { normaliseEmail } from './service.ts';
import { settleEndedSession } from './session-list.ts';
import { admitTry, forgetTries } from './throttle.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

const holdsMs = 60 * 60_000;

/** What is done for a known address takes a few milliseconds, and hides in a time that every answer takes. */
const answerAfterMs = 250;

/**
 * So many askings for one address do their work; more at once would stand in line for a known one, and that could
 * be felt. Waits are short, since whoever forgot their password asks again.
 */
const askingLimits = { freeFailures: 10, firstWaitSeconds: 1, longestWaitSeconds: 60 };

/** Null where a mail would be one too many. */
const issueReset = (
  { site, now }: PublicContext,
  person: { clinicId: string; personId: string },
): Promise<string | null> =>
  withWaysInLocked(site.gate, person.personId, async (gate) => {
    const { clinicId, personId } = person;
    if ((await secondsUntilNextMail(gate, personId, 'password-reset', now)) !== null) return null;
    const id = randomUUID();
    const expiresAt = new Date(now.getTime() + holdsMs);
    await issueToken(gate, { id, clinicId, personId, kind: 'password-reset', expiresAt }, now);
    return id;
  });

/** The row of the mail names the token by its id; what sends it makes the secret of the link from that. */
const mailReset = async (context: PublicContext, email: string): Promise<void> => {
  const { pools, site, now } = context;
  const address = normaliseEmail(email);
  const { admitted } = await admitTry(site.gate, `reset:${address}`, now, askingLimits);
  if (!admitted) return;
  const rows = await drizzle({ client: site.gate, casing: 'snake_case' })
    .select({ clinicId: credentials.clinicId, personId: credentials.personId })
    .from(credentials)
    .where(eq(credentials.email, address));
  const found = rows[0];
  if (!found || !(await actorEntering(pools, found))) return;
  const tokenId = await issueReset(context, found);
  if (tokenId === null) return;
  const { clinicId, personId } = found;
  const occasion = {
    kind: 'password-reset',
    occasion: `reset:${tokenId}`,
    path: `/reset-password#${tokenId}`,
  } as const;
  await withTx(pools.app, { kind: 'system', clinicId }, async (tx) => {
    await notify(tx, clinicId, [personId], occasion, now);
  });
};

/** Known, unknown and over the limit alike: no answer, and none sooner than the others. */
export const askForReset = async (context: PublicContext, email: string): Promise<void> => {
  await Promise.all([mailReset(context, email), wait(answerAfterMs)]);
};

/**
 * The mail shows that somebody reads the mailbox, which is worth a new password and nothing more: a second
 * factor stays, every session ends, and a sign-in follows.
 */
export const resetPassword = async (
  { pools, site, now }: PublicContext,
  { token, password }: { token: string; password: string },
): Promise<void> => {
  const id = idOfLinkToken(site.tokenSecret, token);
  const issued = id && (await tokenById(site.gate, id));
  if (!issued || issued.kind !== 'password-reset') throw new Problem('link-spent');
  const isOpen = issued.usedAt === null && issued.revokedAt === null && issued.expiresAt > now;
  const actor = isOpen ? await actorEntering(pools, issued) : null;
  if (!actor) throw new Problem('link-spent');
  const { clinicId, personId } = actor;
  const owner = await withTx(pools.app, actor, (tx) => personOf(tx, actor));
  refuseCommonPassword(password, owner);
  const passwordHash = await hashPassword(password);
  await withTx(pools.app, actor, async (tx) => {
    await writeAudit(tx, actor, { action: 'password.reset', subjectId: personId }, now);
    await tellSignInChanged(tx, actor, 'password', now);
    // Token and password together: of many at once one gets both, and a failure leaves the link usable.
    await withWaysInLocked(site.gate, personId, async (gate) => {
      if (!(await useToken(gate, issued.id, 'password-reset', now))) throw new Problem('link-spent');
      await writePassword(gate, personId, passwordHash, now);
    });
    for (const ended of await revokeSessionsOf(site.gate, personId, now)) {
      await settleEndedSession(tx, clinicId, ended);
    }
  });
  await forgetTries(site.gate, normaliseEmail(owner.email));
};
