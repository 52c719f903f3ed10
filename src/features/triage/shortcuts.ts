import { useEffect, useEffectEvent } from 'react';
import { useShortcutsOn } from './shortcut-setting.ts';

/** The keys of the morning round. Enter opens what has the focus, by the browser's own hand. */
const shortcutKeys = ['j', 'k', 'c', 'r', 'x', '?'] as const;
type ShortcutKey = (typeof shortcutKeys)[number];
type Shortcuts = Partial<Record<ShortcutKey, () => void>>;

const typingPlaces = 'input, textarea, select, [contenteditable], [role="textbox"], [role="combobox"]';
const layers = '[role="dialog"], [role="alertdialog"], [role="menu"]';

/** Whether a key press is meant for something else: typing, a browser's own command, or what lies on top. */
function isForSomethingElse(event: KeyboardEvent): boolean {
  if (event.defaultPrevented || event.repeat || event.isComposing) return true;
  if (event.ctrlKey || event.metaKey || event.altKey) return true;
  const target = event.target instanceof Element ? event.target : null;
  return Boolean(target?.closest(typingPlaces)) || document.querySelector(layers) !== null;
}

/** Listens to single keys on the whole page while the person has them switched on. */
export function useShortcuts(shortcuts: Shortcuts): void {
  const on = useShortcutsOn();
  const press = useEffectEvent((event: KeyboardEvent) => {
    const key = event.key.toLowerCase();
    const known = shortcutKeys.find((candidate) => candidate === key);
    const act = known && shortcuts[known];
    if (!act || isForSomethingElse(event)) return;
    event.preventDefault();
    act();
  });
  useEffect(() => {
    if (!on) return undefined;
    document.addEventListener('keydown', press);
    return () => document.removeEventListener('keydown', press);
  }, [on]);
}
