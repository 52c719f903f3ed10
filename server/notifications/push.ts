import { createHmac } from 'node:crypto';
import webPush from 'web-push';
import { kindRules, type NotificationKind } from '#shared/notifications/kinds.ts';
import { GatewayFailure } from './gateway-failure.ts';
import { NotDeliverable, type Channel, type Outgoing } from './channels.ts';
import { isPushEndpoint } from './push-endpoint.ts';
import { postPush, PrivateAddress, publicLookup } from './push-request.ts';
import { pushWords } from './wording.ts';

type Vapid = {
  /** P-256, base64url. */
  publicKey: string;
  privateKey: string;
  /** How a push service reaches whoever runs this server: a mailto: or https: address (RFC 8292). */
  subject: string;
};

type PushOptions = {
  vapid: Vapid;
  /** The local fake that takes every push instead of the browser makers' services; they are not called then. */
  fakeUrl?: string | undefined;
};

const hourS = 60 * 60;

/** How long a push service keeps it for a browser that is not on line. An old emergency is told by other means. */
const keptForS = (kind: NotificationKind): number => (kind === 'new-emergency' ? hourS : 24 * hourS);

const urgencyOf = (kind: NotificationKind): 'high' | 'normal' =>
  kindRules[kind].mustReach || kind === 'test' ? 'high' : 'normal';

/** What the service worker shows, and where its click leads. */
const payloadOf = ({ kind, id, path }: Outgoing): string =>
  JSON.stringify({ kind, id, ...pushWords(kind), path, urgency: urgencyOf(kind) });

/** A newer one replaces an older that still waits. Keyed, so that the push service can guess nothing from it. */
const topicOf = (vapid: Vapid, { kind, path }: Outgoing): string =>
  createHmac('sha256', vapid.privateKey).update(`${kind} ${path}`).digest('base64url').slice(0, 24);

/** The fake answers for push.example; what a real browser was given by its maker goes to the fake as well. */
const addressAtFake = (endpoint: string, fakeUrl: string): string => {
  const { hostname, pathname } = new URL(endpoint);
  return new URL(hostname === 'push.example' ? pathname : '/push/elsewhere', fakeUrl).href;
};

const judge = (status: number): void => {
  if (status >= 200 && status < 300) return;
  if (status === 404 || status === 410) throw new NotDeliverable('gone');
  if (status === 408 || status === 429 || status >= 500) throw new GatewayFailure(`http-${status}`);
  throw new NotDeliverable('refused');
};

/** Web Push (RFC 8030): encrypted for one browser (RFC 8291), signed with the server's key (RFC 8292). */
export const openPush = ({ vapid, fakeUrl }: PushOptions): Channel => ({
  send: async (outgoing) => {
    const { subscription, kind } = outgoing;
    if (!subscription) throw new NotDeliverable('gone');
    const { endpoint, p256dh, auth } = subscription;
    if (!isPushEndpoint(endpoint)) throw new NotDeliverable('refused');
    const { headers, body } = webPush.generateRequestDetails(
      { endpoint, keys: { p256dh, auth } },
      payloadOf(outgoing),
      { vapidDetails: vapid, TTL: keptForS(kind), urgency: urgencyOf(kind), topic: topicOf(vapid, outgoing) },
    );
    const request = { headers: headers as Record<string, string | number>, body };
    const sending = fakeUrl
      ? postPush(addressAtFake(endpoint, fakeUrl), request)
      : postPush(endpoint, request, publicLookup);
    judge(
      await sending.catch((error: unknown) => {
        if (error instanceof PrivateAddress) throw new NotDeliverable('refused');
        throw GatewayFailure.from(error);
      }),
    );
    return { providerId: null };
  },
  close: () => undefined,
});
