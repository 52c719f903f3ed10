import { clearDeviceStore } from '#src/lib/device-store.ts';

async function dropDatabases(): Promise<void> {
  if (!('indexedDB' in window)) return;
  const databases = await indexedDB.databases();
  databases.forEach(({ name }) => name !== undefined && indexedDB.deleteDatabase(name));
}

async function dropCaches(): Promise<void> {
  if (!('caches' in window)) return;
  await Promise.all((await caches.keys()).map((name) => caches.delete(name)));
}

async function dropServiceWorkers(): Promise<void> {
  if (!('serviceWorker' in navigator)) return;
  const registrations = await navigator.serviceWorker.getRegistrations();
  await Promise.all(registrations.map((registration) => registration.unregister()));
}

/** Everything that this site keeps in this browser goes: storage, databases, caches, the service worker. */
export async function forgetDevice(): Promise<void> {
  clearDeviceStore();
  // Each goes by itself: what one browser refuses must not keep the others. The server's answer to a sign-out
  // asks the browser for the same (Clear-Site-Data), so that a refusal here leaves nothing behind either.
  await Promise.allSettled([dropDatabases(), dropCaches(), dropServiceWorkers()]);
}
