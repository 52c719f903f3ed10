import { randomUUID } from 'node:crypto';
import { and, eq, ne, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { credentials } from '../../db/schema/gate.ts';
import { people } from '../../db/schema/people.ts';
import { withTx, type Tx } from '../../db/with-tx.ts';
import type { GuardedContext, PublicContext } from '../../http/route.ts';
import { notify } from '../../notifications/service.ts';
import { writeAudit } from '../audit/service.ts';
import { actorEntering } from './entering.ts';
import { secondsUntilNextMail } from './mail-limit.ts';
import { tellSignInChanged } from './notices.ts';
import {
  idOfLinkToken,
  issueToken,
  revokeTokens,
  tokenById,
  useToken,
  type Gate,
} from './one-time-tokens.ts';
import { normaliseEmail } from './service.ts';
import { waysInOf } from './ways-in.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

const holdsMs = 60 * 60_000;

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

/** The same words for whatever is against an address: whether somebody has it is nobody's business. */
const refused = 'That address cannot be used here.';

const refuseTaken = async (tx: Tx, gate: Gate, { clinicId, personId }: PersonActor, email: string) => {
  const accounts = await gateDb(gate)
    .select({ personId: credentials.personId })
    .from(credentials)
    .where(eq(credentials.email, email));
  // Somebody invited has an address and no account yet.
  const invited = await tx
    .select({ id: people.id })
    .from(people)
    .where(
      and(eq(people.clinicId, clinicId), ne(people.id, personId), sql`lower(${people.email}) = ${email}`),
    );
  if (accounts.length === 0 && invited.length === 0) return;
  throw new Problem('invalid-input', undefined, { errors: [{ field: 'email', message: refused }] });
};

/** Issues the one link that holds; the ones before it open nothing any more. */
const issueChange = (
  { actor: { clinicId, personId }, site, now }: GuardedContext,
  id: string,
  email: string,
): Promise<void> =>
  withWaysInLocked(site.gate, personId, async (gate) => {
    const retryAfter = await secondsUntilNextMail(gate, personId, 'email-change', now);
    if (retryAfter !== null) throw new Problem('too-many-attempts', undefined, { retryAfter });
    await revokeTokens(gate, personId, 'email-change', now);
    const expiresAt = new Date(now.getTime() + holdsMs);
    await issueToken(gate, { id, clinicId, personId, kind: 'email-change', expiresAt, email }, now);
  });

/** Mails a link to the new address; what sends it reads that from the token, by the id in the occasion. */
export const askForEmailChange = async (context: GuardedContext, wanted: string): Promise<WaysIn> => {
  const { tx, actor, site, now } = context;
  const email = normaliseEmail(wanted);
  await refuseTaken(tx, site.gate, actor, email);
  const id = randomUUID();
  await writeAudit(tx, actor, { action: 'email-change.asked', subjectId: id }, now);
  await notify(
    tx,
    actor.clinicId,
    [actor.personId],
    { kind: 'email-change', occasion: `email-change:${id}`, path: `/confirm-email#${id}` },
    now,
  );
  // Now, while mail still goes to the old address: whoever reads it can object before the change holds.
  await tellSignInChanged(tx, actor, 'email-asked', now);
  await issueChange(context, id, email);
  return waysInOf(site.gate, actor.personId, now);
};

const uniqueViolation = '23505';

/** The token and the address together; somebody may have taken the address since it was asked for. */
const writeEmail = async (gate: Gate, personId: string, tokenId: string, email: string, now: Date) => {
  if (!(await useToken(gate, tokenId, 'email-change', now))) throw new Problem('link-spent');
  // What was mailed to the old address is not for whoever reads it now.
  await revokeTokens(gate, personId, 'password-reset', now);
  try {
    await gateDb(gate).update(credentials).set({ email }).where(eq(credentials.personId, personId));
  } catch (error) {
    const cause = error instanceof Error ? (error.cause as { code?: unknown } | undefined) : undefined;
    if (cause?.code === uniqueViolation) throw new Problem('state-conflict', refused);
    throw error;
  }
};

export const confirmEmailChange = async (
  { pools, site, now }: PublicContext,
  token: string,
): Promise<void> => {
  const id = idOfLinkToken(site.tokenSecret, token);
  const issued = id && (await tokenById(site.gate, id));
  if (!issued || issued.kind !== 'email-change' || issued.email === null) throw new Problem('link-spent');
  const actor = await actorEntering(pools, issued);
  if (!actor) throw new Problem('link-spent');
  const { email } = issued;
  const { clinicId, personId } = actor;
  await withTx(pools.app, actor, async (tx) => {
    await tx
      .update(people)
      .set({ email, emailBouncedAt: null })
      .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
    await writeAudit(tx, actor, { action: 'email.changed', subjectId: personId }, now);
    await tellSignInChanged(tx, actor, 'email', now);
    await withWaysInLocked(site.gate, personId, (gate) => writeEmail(gate, personId, issued.id, email, now));
  });
};
