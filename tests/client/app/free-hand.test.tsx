import { act, renderHook } from '@testing-library/react';
import type { ReactNode } from 'react';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { chooseSide, useControlsSide } from '#src/app/free-hand.ts';
import { MeContext } from '#src/app/session.tsx';
import { noorSignedIn } from '../clinic/screen.tsx';

const operated = (arm: 'left' | 'right', personId = 'ines'): Me => ({
  ...noorSignedIn,
  personId,
  patient: {
    id: 'p',
    arm,
    controlsTowards: arm === 'left' ? 'right' : 'left',
    state: 'active',
    stateSince: null,
  },
});

const sideFor = (me: Me) =>
  renderHook(() => useControlsSide(), {
    wrapper: ({ children }: { children: ReactNode }) => <MeContext value={me}>{children}</MeContext>,
  });

beforeEach(() => {
  localStorage.clear();
});

describe('the side of the controls', () => {
  it('is the free hand’s: right for a left shoulder, and the other way round', () => {
    expect(sideFor(operated('left')).result.current).toBe('right');
    expect(sideFor(operated('right')).result.current).toBe('left');
  });

  it('follows what the person chose, at once and on the next visit', () => {
    const { result } = sideFor(operated('left'));
    act(() => chooseSide('ines', 'left'));
    expect(result.current).toBe('left');
    expect(sideFor(operated('left')).result.current).toBe('left');
  });

  it('is not changed by what another person chose on the same device', () => {
    chooseSide('wendell', 'left');
    expect(sideFor(operated('left')).result.current).toBe('right');
  });
});
