/**
 * Health data on the device. It outlives the tab only where the person chose to stay signed in; elsewhere it
 * lives in the tab's own storage and goes with it. Every key names the person and the record, so that nobody is
 * ever shown or sends what another one wrote, nor what they wrote themselves about somebody else.
 */
const prefix = 'espalier-data:';

/** Who keeps something, and about whom: null for one's own record, and where there is none. */
export type Keeper = { personId: string; recordId: string | null };

type Kept = Keeper & { onDevice: boolean };

const beginningOf = (personId: string): string => `${prefix}${personId}:`;
const aboutAnother = /^for:([^:]+):(.+)$/;

const keyOf = ({ personId, recordId }: Keeper, name: string): string =>
  `${beginningOf(personId)}${recordId === null ? '' : `for:${recordId}:`}${name}`;

/** Storage can be switched off or full: then a draft simply does not survive the tab. */
function attempt<T>(action: () => T, otherwise: T): T {
  try {
    return action();
  } catch {
    return otherwise;
  }
}

export function keepOnDevice(kept: Kept, name: string, value: unknown): void {
  const key = keyOf(kept, name);
  attempt(
    () => (kept.onDevice ? localStorage : sessionStorage).setItem(key, JSON.stringify(value)),
    undefined,
  );
}

/** Null when nothing is kept, or when what is kept cannot be read. The caller checks the shape. */
export function readFromDevice(kept: Kept, name: string): unknown {
  const key = keyOf(kept, name);
  return attempt(() => {
    const text = sessionStorage.getItem(key) ?? (kept.onDevice ? localStorage.getItem(key) : null);
    return text === null ? null : (JSON.parse(text) as unknown);
  }, null);
}

export function dropFromDevice(keeper: Keeper, name: string): void {
  const key = keyOf(keeper, name);
  attempt(() => {
    sessionStorage.removeItem(key);
    localStorage.removeItem(key);
  }, undefined);
}

/** The records about which this person keeps something under one of the names. */
export function recordsKept(
  { personId, onDevice }: Omit<Kept, 'recordId'>,
  names: readonly string[],
): (string | null)[] {
  const beginning = beginningOf(personId);
  const found = new Set<string | null>();
  attempt(() => {
    for (const storage of onDevice ? [sessionStorage, localStorage] : [sessionStorage]) {
      for (const key of Object.keys(storage).filter((one) => one.startsWith(beginning))) {
        const rest = key.slice(beginning.length);
        const [, recordId = null, name = rest] = aboutAnother.exec(rest) ?? [];
        if (names.includes(name)) found.add(recordId);
      }
    }
  }, undefined);
  return [...found];
}

/** At sign-out: everything of everybody goes, the settings of the device too. */
export function clearDeviceStore(): void {
  attempt(() => sessionStorage.clear(), undefined);
  attempt(() => localStorage.clear(), undefined);
}
