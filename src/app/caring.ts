import { createContext, use } from 'react';
import type { Keeper } from '#src/lib/device-store.ts';
import { carriedId } from './record-choice.ts';
import type { OpenRecord } from './record-choice.ts';
import { useMe } from './session.tsx';

export const RecordContext = createContext<OpenRecord | null>(null);

/** The record that the patient's screens are about; only below `RequireRecord`, which sees to it that there is one. */
export function useRecord(): OpenRecord {
  const record = use(RecordContext);
  if (!record) throw new Error('useRecord needs RequireRecord above it.');
  return record;
}

/**
 * Before surgery and after the clinic stopped watching there is no check-in; nor where the patient wants it so.
 * The table of the states says the same, and a test holds the two together: Today has no room for the table.
 */
export const mayCheckIn = ({ state, caring }: OpenRecord): boolean =>
  (state === 'active' || state === 'paused') && caring?.mayCheckIn !== false;

/** Whose storage on this device holds what is written here: the person's, and apart for each record. */
export function useKeeper(): Keeper {
  const { personId } = useMe();
  return { personId, recordId: carriedId(use(RecordContext)) };
}
