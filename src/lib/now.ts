import { useEffect, useState } from 'react';
import { serverNow } from './server-clock.ts';

/** Often enough for times that are told to the minute. */
const tickMs = 20_000;

/** The server's time as far as it is known here, renewed while the screen is open. */
export function useNowMs(everyMs = tickMs): number {
  const [nowMs, setNowMs] = useState(serverNow);
  useEffect(() => {
    const timer = setInterval(() => setNowMs(serverNow()), everyMs);
    return () => clearInterval(timer);
  }, [everyMs]);
  return nowMs;
}
