import type { NotificationChannel, NotificationKind } from '#shared/notifications/kinds.ts';

/** One notification on its way out: its wording follows from the kind alone. */
export type Outgoing = {
  id: string;
  clinicId: string;
  kind: NotificationKind;
  channel: NotificationChannel;
  /** Where its link leads, below the public address; for a one-time link with the secret in the fragment. */
  path: string;
  email: string;
  /** E.164. */
  phone: string | null;
  /** For push: the browser it goes to. */
  subscription: { endpoint: string; p256dh: string; auth: string } | null;
};

/** What a gateway calls it, where it gives a name. */
export type Sent = { providerId: string | null };

/** Hands one notification to the outside. It throws `NotDeliverable` where trying again is no use. */
export type Channel = { send: (outgoing: Outgoing) => Promise<Sent>; close: () => void };

/**
 * `bounced`: the address refuses for good. `gone`: the browser let itself be woken once and no longer does.
 * `refused`: the gateway does not take it. `not-configured`: this
 * installation has no such gateway. The reason is a code of ours, never the words of a foreign server.
 */
export class NotDeliverable extends Error {
  readonly reason: 'bounced' | 'gone' | 'refused' | 'not-configured';

  constructor(reason: NotDeliverable['reason']) {
    super(reason);
    this.name = 'NotDeliverable';
    this.reason = reason;
  }
}
