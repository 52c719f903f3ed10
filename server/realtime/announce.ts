import { sql } from 'drizzle-orm';
import type { Hint } from '#shared/realtime/hints.ts';
import type { Tx } from '../db/with-tx.ts';

/**
 * Who a hint is for: the clinicians of a clinic, one person, or everybody who acts on a patient's record, which
 * is the patient and the caregivers.
 */
export type Audience = { clinicians: string } | { person: string } | { patient: string };

export type Announcement =
  | { to: Audience; hint: Hint }
  | { endedSession: string }
  /** Roles, care or access of that person changed: every open socket is judged anew. */
  | { changedPerson: string };

/** The channel on which every web listens. A payload holds ids and numbers only. */
export const hintChannel = 'espalier_hints';

const notify = async (tx: Tx, announcement: Announcement): Promise<void> => {
  await tx.execute(sql`select pg_notify(${hintChannel}, ${JSON.stringify(announcement)})`);
};

/** Goes out when the transaction commits, and not at all when it does not. */
export const announce = (tx: Tx, to: Audience, hint: Hint): Promise<void> => notify(tx, { to, hint });

/** Every web judges that person's sockets anew: what they may no longer hear ends at once. */
export const announcePersonChange = (tx: Tx, personId: string): Promise<void> =>
  notify(tx, { changedPerson: personId });

/** Every web closes the sockets of that session. */
export const announceSessionEnd = (tx: Tx, sessionId: string): Promise<void> =>
  notify(tx, { endedSession: sessionId });
