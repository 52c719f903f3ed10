export function lock(path: string, whileWaiting: (holder: number) => void): Promise<() => void>;
