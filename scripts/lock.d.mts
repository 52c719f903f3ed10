export function tryLock(path: string): { release: () => void } | { heldBy: number };
export function lock(path: string, whileWaiting: (holder: number) => void): Promise<() => void>;
