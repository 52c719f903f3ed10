import { renderHook } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import type { FlagRow } from '#shared/triage/contract.ts';
import { useArrivals } from '#src/features/triage/arrivals.ts';
import { aRow } from './flags.ts';

type Props = { flags: FlagRow[] | undefined; openId: string | null };

function follow(first: FlagRow[] | undefined) {
  const initialProps: Props = { flags: first, openId: null };
  return renderHook(({ flags, openId }: Props) => useArrivals(flags, openId), { initialProps });
}

const ines = aRow({ id: 'ines' });
const tobias = aRow({ id: 'tobias' });
const idsOf = (flags: readonly FlagRow[]) => flags.map(({ id }) => id);

describe('what is new in the round', () => {
  it('is nothing when the round is loaded for the first time', () => {
    const { result, rerender } = follow(undefined);
    rerender({ flags: [ines, tobias], openId: null });
    expect(result.current.latest).toEqual([]);
  });

  it('is a flag that was not there before, until it is opened', () => {
    const { result, rerender } = follow([ines]);
    const flags = [ines, tobias];
    rerender({ flags, openId: null });
    expect(idsOf(result.current.latest)).toEqual(['tobias']);
    expect(result.current.unopened).toEqual(new Set(['tobias']));
    rerender({ flags, openId: 'tobias' });
    expect(result.current.latest).toEqual([]);
    expect(result.current.unopened).toEqual(new Set());
  });

  it('is a flag that has been raised to a higher urgency', () => {
    const { result, rerender } = follow([ines]);
    rerender({ flags: [aRow({ id: 'ines', urgency: 'emergency' })], openId: null });
    expect(idsOf(result.current.latest)).toEqual(['ines']);
  });

  it('is not a flag that only a colleague has claimed or given back', () => {
    const { result, rerender } = follow([ines]);
    rerender({ flags: [aRow({ id: 'ines', state: 'claimed' })], openId: null });
    rerender({ flags: [], openId: null });
    rerender({ flags: [ines], openId: null });
    expect(result.current.latest).toEqual([]);
  });
});
