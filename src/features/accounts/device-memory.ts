/**
 * What this browser remembers for the sign-in page. It names nobody, so that it may outlive a session; signing
 * out clears it with the rest of the storage.
 */
type Memory = 'passkey-used' | 'own-phone';

const keyOf = (memory: Memory): string => `espalier-sign-in:${memory}`;

export function remember(memory: Memory, holds: boolean): void {
  try {
    if (holds) localStorage.setItem(keyOf(memory), 'yes');
    else localStorage.removeItem(keyOf(memory));
  } catch {
    // Without storage the page offers the ways in the usual order.
  }
}

export function remembers(memory: Memory): boolean {
  try {
    return localStorage.getItem(keyOf(memory)) === 'yes';
  } catch {
    return false;
  }
}
