import { useState } from 'react';
import { dropFromDevice, keepOnDevice, readFromDevice } from './device-store.ts';
import type { Keeper } from './device-store.ts';

/** A text that is not sent yet, under the id that it will be sent with, so that a repeat is the same message. */
export type Draft = { id: string; text: string };

const freshDraft = (text = ''): Draft => ({ id: crypto.randomUUID(), text });

function readDraft(keeper: Keeper, name: string): Draft {
  const kept = readFromDevice({ ...keeper, onDevice: false }, name);
  if (typeof kept === 'object' && kept !== null && 'id' in kept && 'text' in kept) {
    const { id, text } = kept;
    if (typeof id === 'string' && typeof text === 'string') return { id, text };
  }
  return freshDraft();
}

export type DraftHandle = {
  draft: Draft;
  write: (text: string) => void;
  /** The text goes out as a new message: what was sent under the old id stays as it is. */
  renewId: () => void;
  /** It was sent: an empty draft with an id of its own takes its place. */
  clear: () => void;
};

/**
 * The draft of one person, about one record, in one place. It survives a reload of this tab and ends with the tab. A component
 * that goes to another place must be made anew (by `key`).
 */
export function useDraft(keeper: Keeper, place: string): DraftHandle {
  const name = `draft:${place}`;
  const [draft, setDraft] = useState(() => readDraft(keeper, name));
  function keep(next: Draft) {
    if (next.text === '') dropFromDevice(keeper, name);
    else keepOnDevice({ ...keeper, onDevice: false }, name, next);
    setDraft(next);
  }
  return {
    draft,
    write: (text) => keep({ ...draft, text }),
    renewId: () => keep(freshDraft(draft.text)),
    clear: () => keep(freshDraft()),
  };
}
