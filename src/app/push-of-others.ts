/**
 * What an earlier user of this device let be woken is never left to the next one. Where the browser carries
 * nothing, as almost everywhere, no further code is fetched.
 */
export async function dropForeignPush(personId: string): Promise<void> {
  if (!('serviceWorker' in navigator)) return;
  const registration = await navigator.serviceWorker.getRegistration('/');
  const subscription = await registration?.pushManager?.getSubscription();
  if (!subscription) return;
  const { settlePush } = await import('./push.ts');
  await settlePush(personId, subscription);
}
