import type { Tx } from '../../db/with-tx.ts';
import { revokeSessionsOf } from '../../http/sessions.ts';
import type { Site } from '../../http/site.ts';
import { forgetPushOfPerson } from '../../notifications/push-subscriptions.ts';
import { announcePersonChange } from '../../realtime/announce.ts';
import { settleEndedSession } from '../accounts/session-list.ts';

type Somebody = { clinicId: string; personId: string };

/** Ends every session of somebody at once, with its sockets and its push. */
export const endSessions = async (
  tx: Tx,
  site: Site,
  { clinicId, personId }: Somebody,
  now: Date,
): Promise<void> => {
  for (const sessionId of await revokeSessionsOf(site.gate, personId, now)) {
    await settleEndedSession(tx, clinicId, sessionId);
  }
};

/**
 * Ends sessions, sockets and push of somebody who is no longer active; that they are not is the caller's to
 * write. A session that starts in between finds nobody active and opens nothing.
 */
export const endAccess = async (tx: Tx, site: Site, person: Somebody, now: Date): Promise<void> => {
  await endSessions(tx, site, person, now);
  await forgetPushOfPerson(tx, person.clinicId, person.personId);
  await announcePersonChange(tx, person.personId);
};
