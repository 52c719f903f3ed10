import { and, eq } from 'drizzle-orm';
import type { listSessions } from '#shared/accounts/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { pushSubscriptions } from '../../db/schema/notifications.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { GuardedContext } from '../../http/route.ts';
import { liveSessionsOf, revokeSessionOf, revokeSessionsOf } from '../../http/sessions.ts';
import { forgetPushOfSession } from '../../notifications/push-subscriptions.ts';
import { announceSessionEnd } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { deviceName } from './devices.ts';

const sessionsWithPush = async (tx: Tx, { clinicId, personId }: PersonActor): Promise<Set<string>> => {
  const rows = await tx
    .select({ sessionId: pushSubscriptions.sessionId })
    .from(pushSubscriptions)
    .where(and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.personId, personId)));
  return new Set(rows.map(({ sessionId }) => sessionId));
};

export const ownSessions = async ({
  tx,
  actor,
  browser,
  site,
  now,
}: GuardedContext): Promise<OutputOf<typeof listSessions>> => {
  const withPush = await sessionsWithPush(tx, actor);
  const live = await liveSessionsOf(site.gate, actor.personId, now);
  return {
    sessions: live.map(({ sessionId, userAgent, startedAt, lastActivityAt, idleAfterMs }) => ({
      id: sessionId,
      device: deviceName(userAgent),
      startedAt: startedAt.toISOString(),
      lastActivityAt: lastActivityAt.toISOString(),
      current: sessionId === browser.signedIn?.sessionId,
      staysSignedIn: idleAfterMs === null,
      push: withPush.has(sessionId),
    })),
  };
};

/** What a session leaves behind: its sockets close, and its browser is woken no more. */
export const settleEndedSession = async (tx: Tx, clinicId: string, sessionId: string): Promise<void> => {
  await forgetPushOfSession(tx, clinicId, sessionId);
  await announceSessionEnd(tx, sessionId);
};

/** A session of somebody else looks like one that is not there. */
export const endOwnSession = async (
  { tx, actor, site, now }: GuardedContext,
  sessionId: string,
): Promise<void> => {
  const { clinicId, personId } = actor;
  await writeAudit(tx, actor, { action: 'session.ended-elsewhere', subjectId: sessionId }, now);
  await settleEndedSession(tx, clinicId, sessionId);
  // Last, since what the gate has written stays written. Where it finds none, the rest is undone.
  if (!(await revokeSessionOf(site.gate, { personId, sessionId }, now))) throw new Problem('not-found');
};

/** Ends every other session of theirs; how many of them were alive. */
export const endOwnOtherSessions = async ({
  tx,
  actor,
  browser,
  site,
  now,
}: GuardedContext): Promise<number> => {
  const kept = browser.signedIn?.sessionId ?? null;
  const live = await liveSessionsOf(site.gate, actor.personId, now);
  const others = new Set(live.map(({ sessionId }) => sessionId).filter((id) => id !== kept));
  await writeAudit(tx, actor, { action: 'sessions.ended-elsewhere', detail: { sessions: others.size } }, now);
  const ended = await revokeSessionsOf(site.gate, actor.personId, now, kept);
  for (const sessionId of ended) await settleEndedSession(tx, actor.clinicId, sessionId);
  return ended.filter((id) => others.has(id)).length;
};
