let aheadMs = 0;

/** Learns from an answer's `Date` header (exact to a second) how far the server's clock is ahead of this one. */
export function noteServerDate(header: string | null): void {
  const serverMs = header === null ? Number.NaN : Date.parse(header);
  if (!Number.isNaN(serverMs)) aheadMs = serverMs - Date.now();
}

/** The server's time, as far as this device knows it; its own time before the first answer. */
export const serverNow = (): number => Date.now() + aheadMs;
