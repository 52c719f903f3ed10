import type {
  addPushSubscription,
  getPushKey,
  listPushSubscriptions,
  removePushSubscription,
} from '#shared/notifications/contract.ts';
import { call } from '#src/lib/api.ts';

/** Whose push this browser carries, so that it is never left to whoever uses the device next. Ids only. */
type Mark = { personId: string; subscriptionId: string; endpoint: string };

const markKey = 'espalier-push';

function readMark(): Mark | null {
  try {
    return JSON.parse(localStorage.getItem(markKey) ?? 'null') as Mark | null;
  } catch {
    // Without a mark nobody is known to own it, and what nobody owns is removed.
    return null;
  }
}

function keepMark(mark: Mark | null): void {
  try {
    if (mark) localStorage.setItem(markKey, JSON.stringify(mark));
    else localStorage.removeItem(markKey);
  } catch {
    // Without storage the subscription has no mark, and is removed at the next sign-in.
  }
}

/** What a browser can do about push, before anybody is asked. */
export type PushAbility = 'able' | 'denied' | 'needs-home-screen' | 'unsupported';

export function pushAbility(): PushAbility {
  if ('serviceWorker' in navigator && 'PushManager' in window && 'Notification' in window) {
    return Notification.permission === 'denied' ? 'denied' : 'able';
  }
  return isAppleTouchDevice() ? 'needs-home-screen' : 'unsupported';
}

/** On these, push exists only for what was added to the home screen. An iPad calls itself a Macintosh. */
const isAppleTouchDevice = (): boolean =>
  /iPhone|iPad|iPod/.test(navigator.userAgent) ||
  (navigator.userAgent.includes('Macintosh') && navigator.maxTouchPoints > 1);

const registration = async (): Promise<ServiceWorkerRegistration | undefined> =>
  'serviceWorker' in navigator ? navigator.serviceWorker.getRegistration('/') : undefined;

/** The browser's own subscription, if it has one. */
export const browserSubscription = async (): Promise<PushSubscription | null> =>
  (await (await registration())?.pushManager?.getSubscription()) ?? null;

/** Hands the browser's subscription to the server under the session of whoever is signed in. */
async function register(personId: string, subscription: PushSubscription) {
  const { endpoint, keys } = subscription.toJSON();
  const kept = await call<typeof addPushSubscription>('post', '/api/push-subscriptions', {
    body: { endpoint: endpoint ?? '', p256dh: keys?.p256dh ?? '', auth: keys?.auth ?? '' },
  });
  keepMark({ personId, subscriptionId: kept.id, endpoint: subscription.endpoint });
  return kept;
}

function bytesOf(base64url: string): Uint8Array<ArrayBuffer> {
  const text = atob(base64url.replaceAll('-', '+').replaceAll('_', '/'));
  return Uint8Array.from(text, (letter) => letter.charCodeAt(0));
}

/**
 * Lets this browser be woken. Only on a press: it may ask for the permission. False where the person said no.
 */
export async function turnPushOn(personId: string): Promise<boolean> {
  if ((await Notification.requestPermission()) !== 'granted') return false;
  const { publicKey } = await call<typeof getPushKey>('get', '/api/push-key', {});
  await navigator.serviceWorker.register('/service-worker.js');
  const { pushManager } = await navigator.serviceWorker.ready;
  // One that was made for another key, or for somebody else, is not taken over.
  await (await pushManager.getSubscription())?.unsubscribe();
  const subscription = await pushManager.subscribe({
    userVisibleOnly: true,
    applicationServerKey: bytesOf(publicKey),
  });
  await register(personId, subscription);
  return true;
}

/** Ends what the browser carries, for whomever it was. */
export async function dropBrowserPush(): Promise<void> {
  keepMark(null);
  await (await browserSubscription())?.unsubscribe();
}

const remove = (subscriptionId: string): Promise<void> =>
  call<typeof removePushSubscription>('delete', '/api/push-subscriptions/:subscriptionId', {
    params: { subscriptionId },
  });

/** Wakes this browser no more: neither the browser nor the server keeps anything of it. */
export async function turnPushOff(subscriptionId: string): Promise<void> {
  await remove(subscriptionId);
  await dropBrowserPush();
}

/**
 * After a sign-in: keeps the subscription that is this person's own and hands it to the new session, and removes
 * any other. One that its owner removed from another device is not brought back; one that the browser renewed
 * is told to the server.
 */
export async function settlePush(personId: string, subscription: PushSubscription): Promise<void> {
  const own = readMark();
  // Nobody has to be asked about somebody else's, so that it goes off line too.
  if (own?.personId !== personId) return dropBrowserPush();
  const { subscriptions } = await call<typeof listPushSubscriptions>('get', '/api/push-subscriptions', {});
  const listed = subscriptions.find(({ id }) => id === own.subscriptionId);
  const renewed = own.endpoint !== subscription.endpoint;
  if (!renewed && !listed) return dropBrowserPush();
  if (renewed || !listed?.current) {
    const kept = await register(personId, subscription);
    if (listed && kept.id !== listed.id) await remove(listed.id);
  }
}
