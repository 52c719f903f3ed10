/**
 * Health data on the device. It outlives the tab only where the person chose to stay signed in; elsewhere it
 * lives in the tab's own storage and goes with it. Every key names the person, so that nobody is ever shown or
 * sends what another one wrote.
 */
const prefix = 'espalier-data:';

type Kept = { personId: string; onDevice: boolean };

const keyOf = (personId: string, name: string): string => `${prefix}${personId}:${name}`;

/** Storage can be switched off or full: then a draft simply does not survive the tab. */
function attempt<T>(action: () => T, otherwise: T): T {
  try {
    return action();
  } catch {
    return otherwise;
  }
}

export function keepOnDevice({ personId, onDevice }: Kept, name: string, value: unknown): void {
  const key = keyOf(personId, name);
  attempt(() => (onDevice ? localStorage : sessionStorage).setItem(key, JSON.stringify(value)), undefined);
}

/** Null when nothing is kept, or when what is kept cannot be read. The caller checks the shape. */
export function readFromDevice({ personId, onDevice }: Kept, name: string): unknown {
  const key = keyOf(personId, name);
  return attempt(() => {
    const text = sessionStorage.getItem(key) ?? (onDevice ? localStorage.getItem(key) : null);
    return text === null ? null : (JSON.parse(text) as unknown);
  }, null);
}

export function dropFromDevice(personId: string, name: string): void {
  const key = keyOf(personId, name);
  attempt(() => {
    sessionStorage.removeItem(key);
    localStorage.removeItem(key);
  }, undefined);
}

/** At sign-out: everything of everybody goes. */
export function clearDeviceStore(): void {
  attempt(() => {
    for (const storage of [sessionStorage, localStorage]) {
      Object.keys(storage)
        .filter((key) => key.startsWith(prefix))
        .forEach((key) => storage.removeItem(key));
    }
  }, undefined);
}
