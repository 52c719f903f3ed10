import { render, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import type { TrellisData } from '#shared/plans/trellis.ts';
import { Trellis } from '#src/features/plans/Trellis.tsx';

const data: TrellisData = {
  arm: 'left',
  today: 3,
  phases: [
    { code: 'protect', name: 'Protect', openedOnDay: 0, usualStartDay: 0, usualEndDay: 42 },
    { code: 'motion', name: 'Motion', openedOnDay: null, usualStartDay: 42, usualEndDay: 84 },
  ],
  days: [
    { day: 1, kind: 'check-in' },
    { day: 2, kind: 'flagged' },
  ],
  review: { day: 42, week: 6, date: '2026-12-19' },
};

test.each(['large', 'small'] as const)('the %s trellis is one picture with its text equivalent', (size) => {
  render(<Trellis data={data} size={size} label="Day 3, 2 of 2 check-ins" />);
  expect(screen.getAllByRole('img')).toHaveLength(1);
  expect(screen.getByRole('img', { name: 'Day 3, 2 of 2 check-ins' })).toBeTruthy();
});

test('the large trellis shows the names of the phases and the review beside the drawing', () => {
  const { container } = render(
    <Trellis data={data} size="large" label="Day 3" reviewLabel="6-week review · 19 Dec" />,
  );
  expect(container.textContent).toBe('ProtectMotion6-week review · 19 Dec');
});

test('a flagged day is drawn in another outline than the others, not only in another colour', () => {
  const { container } = render(<Trellis data={data} size="large" label="Day 3" />);
  const flagged = container.querySelector('.fill-ochre')?.getAttribute('d');
  const ordinary = container.querySelector('path.fill-leaf')?.getAttribute('d');
  const commands = (path: string | null | undefined) => path?.replace(/[^A-Z]/gu, '');
  expect(commands(flagged)).toBeTruthy();
  expect(commands(flagged)).not.toBe(commands(ordinary));
});

test('nothing in the drawing is undefined or not a number', () => {
  const { container } = render(<Trellis data={{ ...data, days: [], today: 0 }} size="large" label="Day 0" />);
  expect(container.innerHTML).not.toMatch(/NaN|undefined/u);
});
