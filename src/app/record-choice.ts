import type { CaredFor, Me } from '#shared/accounts/contract.ts';
import { createSignal } from '#src/lib/signal.ts';

/** The record that this tab acts on: one's own, or that of somebody one looks after. */
export type OpenRecord = NonNullable<Me['patient']> & {
  /** What the patient lets this person do; null where the record is one's own. */
  caring: Pick<CaredFor, 'name' | 'mayCheckIn' | 'mayMessage' | 'until'> | null;
};

/** Another record was chosen in this tab. */
export const recordChosen = createSignal<void>();

const keyOf = (personId: string): string => `espalier-record:${personId}`;

/** Where storage is switched off the choice lives as long as the page. */
const withoutStorage = new Map<string, string>();

/** What was chosen in this tab. Each tab has its own, so that two records can stand beside each other. */
export function chosenRecordId(personId: string): string | null {
  try {
    return sessionStorage.getItem(keyOf(personId));
  } catch {
    return withoutStorage.get(personId) ?? null;
  }
}

export function keepChoice(personId: string, recordId: string): void {
  try {
    sessionStorage.setItem(keyOf(personId), recordId);
  } catch {
    withoutStorage.set(personId, recordId);
  }
  recordChosen.emit();
}

const cared = ({ name, mayCheckIn, mayMessage, until, ...card }: CaredFor): OpenRecord => ({
  ...card,
  caring: { name, mayCheckIn, mayMessage, until },
});

/**
 * The record that this tab acts on. Without a choice it is one's own, or the only one there is. A choice that no
 * longer holds is no record: nobody is moved on to somebody else's without a word.
 */
export function recordOf({ personId, patient, caresFor }: Me): OpenRecord | null {
  const chosen = chosenRecordId(personId);
  const own = patient ? { ...patient, caring: null } : null;
  if (chosen === null && own) return own;
  if (chosen !== null && chosen === own?.id) return own;
  const found = chosen === null ? only(caresFor) : caresFor.find(({ id }) => id === chosen);
  return found ? cared(found) : null;
}

const only = (caresFor: readonly CaredFor[]): CaredFor | undefined =>
  caresFor.length === 1 ? caresFor[0] : undefined;

/** The id that calls about a record of somebody else carry; null where the record is one's own. */
export const carriedId = (record: OpenRecord | null): string | null => (record?.caring ? record.id : null);
