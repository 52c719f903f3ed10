import { render } from '@testing-library/react';
import { expect, test } from 'vitest';
import { SignInTree } from '#src/features/accounts/SignInTree.tsx';
import { dressingOf, seasonOf, tiers } from '#src/features/accounts/sign-in-tree.ts';

test.each([
  [1, 'winter'],
  [2, 'winter'],
  [3, 'spring'],
  [5, 'spring'],
  [6, 'summer'],
  [8, 'summer'],
  [9, 'autumn'],
  [11, 'autumn'],
  [12, 'winter'],
] as const)('month %i is %s', (month, season) => {
  expect(seasonOf(month)).toBe(season);
});

test.each([
  ['winter', ['bud']],
  ['spring', ['blossom', 'leaf']],
  ['summer', ['leaf']],
  ['autumn', ['fruit', 'leaf']],
] as const)('in %s every branch carries %s', (season, kinds) => {
  for (const tier of tiers) {
    for (const side of [-1, 1] as const) {
      const found = new Set(dressingOf(tier, side, season).map(({ kind }) => kind));
      expect([...found].sort()).toEqual(kinds);
    }
  }
});

test('nothing grows beyond the end of its branch, and fruit hangs below', () => {
  for (const tier of tiers) {
    const dressings = dressingOf(tier, 1, 'autumn');
    expect(Math.max(...dressings.map(({ along }) => along))).toBeLessThanOrEqual(tier.reach);
    expect(dressings.filter(({ kind, up }) => kind === 'fruit' && up)).toEqual([]);
  }
});

test('the tree is decoration and hidden from those who hear the screen', () => {
  const { container } = render(<SignInTree month={10} />);
  expect(container.querySelector('svg')?.getAttribute('aria-hidden')).toBe('true');
  expect(container.innerHTML).not.toMatch(/NaN|undefined/u);
});
