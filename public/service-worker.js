/**
 * Shows a push and opens what it is about. It keeps nothing: no page and no answer of the server is ever cached
 * here, so there is nothing to be found on the device after a sign-out.
 */

/** For a push whose content cannot be read. Like every wording it names nobody and nothing. */
const neutral = { title: 'Espalier', body: 'Something is waiting for you. Sign in to read it.' };

/** A place of this site; anything else leads to the first page. */
function placeOf(path) {
  if (typeof path !== 'string' || !/^\/(?![/\\])/.test(path)) return '/';
  const url = new URL(path, self.location.origin);
  return url.origin === self.location.origin ? url.pathname + url.search : '/';
}

function readPush(data) {
  try {
    const { title, body, path } = data.json();
    if (typeof title !== 'string' || typeof body !== 'string') return { ...neutral, path: '/' };
    return { title, body, path: placeOf(path) };
  } catch {
    return { ...neutral, path: '/' };
  }
}

self.addEventListener('install', () => self.skipWaiting());
self.addEventListener('activate', (event) => event.waitUntil(self.clients.claim()));

self.addEventListener('push', (event) => {
  const { title, body, path } = readPush(event.data);
  event.waitUntil(
    self.registration.showNotification(title, {
      body,
      lang: 'en',
      icon: '/icon-192.png',
      badge: '/badge-96.png',
      // One notice for each place: a newer one takes the place of the older, and sounds again.
      tag: path,
      renotify: true,
      data: { path },
    }),
  );
});

/** An open tab goes there; a page that is not signed in asks for the sign-in first and goes there afterwards. */
async function open(path) {
  const tabs = await self.clients.matchAll({ type: 'window', includeUncontrolled: true });
  for (const tab of tabs) {
    try {
      const moved = await tab.navigate(path);
      await (moved ?? tab).focus();
      return;
    } catch {
      // A tab that this worker does not control cannot be moved: the next one, or a new one, can.
    }
  }
  await self.clients.openWindow(path);
}

self.addEventListener('notificationclick', (event) => {
  event.notification.close();
  event.waitUntil(open(placeOf(event.notification.data?.path)));
});

/** The browser renewed its subscription. The page tells the server at its next start: only it may write there. */
self.addEventListener('pushsubscriptionchange', (event) => {
  const key = event.oldSubscription?.options.applicationServerKey;
  if (event.newSubscription || !key) return;
  event.waitUntil(
    self.registration.pushManager.subscribe({ userVisibleOnly: true, applicationServerKey: key }),
  );
});
