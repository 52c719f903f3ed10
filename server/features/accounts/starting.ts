import { and, eq, isNull } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { isStaff } from '#shared/access/permissions.ts';
import type { Me } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { signedInSessions } from '../../db/schema/gate.ts';
import { pushSubscriptions } from '../../db/schema/notifications.ts';
import { people } from '../../db/schema/people.ts';
import type { Pools } from '../../db/pools.ts';
import { withTx } from '../../db/with-tx.ts';
import type { Browser } from '../../http/browser.ts';
import type { SecondFactor } from '../../http/sessions.ts';
import { forgetPushOfSession } from '../../notifications/push-subscriptions.ts';
import { announceSessionEnd } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { loadPersonActor } from './queries.ts';
import { describeMe } from './service.ts';

type Surroundings = { browser: Browser; pools: Pools; now: Date };
type Someone = { clinicId: string; personId: string };

const holderOf = async ({ gate }: Pools, sessionId: string) => {
  const rows = await drizzle({ client: gate, casing: 'snake_case' })
    .select({ clinicId: signedInSessions.clinicId, personId: signedInSessions.personId })
    .from(signedInSessions)
    .where(eq(signedInSessions.id, sessionId));
  return rows[0] ?? null;
};

/**
 * What the browser's former session left: push of somebody else ends, for a shared device must not show it to
 * the next one; push of the same person goes on with the new session.
 */
const settleFormerPush = async (pools: Pools, formerId: string, person: Someone, sessionId: string) => {
  const holder = await holderOf(pools, formerId);
  if (!holder) return;
  // The former session may be of another clinic, whose rows only that clinic's transaction sees.
  await withTx(pools.app, { kind: 'system', clinicId: holder.clinicId }, async (tx) => {
    if (holder.personId !== person.personId) {
      await forgetPushOfSession(tx, holder.clinicId, formerId);
      return;
    }
    await tx
      .update(pushSubscriptions)
      .set({ sessionId })
      .where(and(eq(pushSubscriptions.clinicId, holder.clinicId), eq(pushSubscriptions.sessionId, formerId)));
  });
};

/** Signs somebody in who has shown who they are: the one place where a session of a browser begins. */
export const beginSession = async (
  { browser, pools, now }: Surroundings,
  { clinicId, personId }: Someone,
  { staySignedIn, secondFactor }: { staySignedIn: boolean; secondFactor: SecondFactor | null },
): Promise<Me> => {
  const person = { kind: 'person', clinicId, personId } as const;
  const actor = await withTx(pools.app, person, (tx) => loadPersonActor(tx, person));
  if (!actor) throw new Problem('wrong-sign-in');
  const { signedIn: replaced, formerSessionId } = browser;
  const session = await browser.start(
    { clinicId, personId, isStaff: isStaff(actor.roles), secondFactor },
    staySignedIn,
  );
  if (formerSessionId) await settleFormerPush(pools, formerSessionId, person, session.sessionId);
  return withTx(pools.app, person, async (tx) => {
    await tx
      .update(people)
      .set({ firstSignedInAt: now })
      .where(and(eq(people.clinicId, clinicId), eq(people.id, personId), isNull(people.firstSignedInAt)));
    await writeAudit(tx, person, { action: 'session.started', subjectId: session.sessionId }, now);
    if (replaced) await announceSessionEnd(tx, replaced.sessionId);
    return describeMe(tx, actor, session, browser.writeToken(session), now);
  });
};
