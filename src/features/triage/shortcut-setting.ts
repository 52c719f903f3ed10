import { useSyncExternalStore } from 'react';
import { createSignal } from '#src/lib/signal.ts';

/** Single keys can be hit by mistake or by dictation, so each person can switch them off on their device. */
const storedName = 'espalier.single-key-shortcuts';

const changed = createSignal<void>();
let held: boolean | null = null;

function readSetting(): boolean {
  try {
    return localStorage.getItem(storedName) !== 'off';
  } catch {
    // Storage is blocked here: the setting then lasts as long as the page.
    return true;
  }
}

const shortcutsOn = (): boolean => (held ??= readSetting());

export function setShortcutsOn(on: boolean): void {
  held = on;
  try {
    localStorage.setItem(storedName, on ? 'on' : 'off');
  } catch {
    // As above: kept in memory only.
  }
  changed.emit();
}

export const useShortcutsOn = (): boolean => useSyncExternalStore(changed.subscribe, shortcutsOn);
