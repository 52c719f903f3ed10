import { useState } from 'react';
import type { FlagRow } from '#shared/triage/contract.ts';

type Known = ReadonlyMap<string, FlagRow['urgency']>;

/** Flags that were not there before, and those that have been raised to another urgency since. */
const arrivedSince = (known: Known, flags: readonly FlagRow[]): FlagRow[] =>
  flags.filter((flag) => known.get(flag.id) !== flag.urgency);

type Arrivals = {
  /** What the last change of the round brought, for the live region. */
  latest: readonly FlagRow[];
  /** Everything that came while the page was open and has not been opened. */
  unopened: ReadonlySet<string>;
};

type Watched = Arrivals & { of: readonly FlagRow[]; known: Known };

/** Once known a flag stays known, so that one which comes back to the round is no news. */
function watch(before: Watched | null, flags: readonly FlagRow[]): Watched {
  const known = new Map([
    ...(before?.known ?? []),
    ...flags.map(({ id, urgency }) => [id, urgency] as const),
  ]);
  // The first round that is loaded is where one starts from.
  const arrived = before ? arrivedSince(before.known, flags) : [];
  return {
    of: flags,
    known,
    latest: arrived.length > 0 ? arrived : (before?.latest ?? []),
    unopened: new Set([...(before?.unopened ?? []), ...arrived.map(({ id }) => id)]),
  };
}

const withoutOpened = (watched: Watched, openId: string): Watched => ({
  ...watched,
  latest: watched.latest.filter(({ id }) => id !== openId),
  unopened: new Set([...watched.unopened].filter((id) => id !== openId)),
});

/** Follows the round and tells what is new in it; opening a flag ends its being new. */
export function useArrivals(flags: readonly FlagRow[] | undefined, openId: string | null): Arrivals {
  const [watched, setWatched] = useState<Watched | null>(null);
  if (flags && flags !== watched?.of) setWatched(watch(watched, flags));
  else if (watched && openId !== null && watched.unopened.has(openId)) {
    setWatched(withoutOpened(watched, openId));
  }
  return watched ?? { latest: [], unopened: new Set() };
}
