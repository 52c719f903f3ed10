import { expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { besideUsual } from '#server/features/triage/beside.ts';

const painOf = (answers: Answers) =>
  besideUsual(answers, { painNow: 3, painWorst: 4 }, { painNow: [], painWorst: [] })
    .slice(0, 2)
    .map(({ label, today }) => [label, today]);

test('what came as something new says that pain was not asked', () => {
  expect(painOf({ symptoms: ['wound-opened'] })).toEqual([
    ['Pain now', 'not asked'],
    ['Pain at worst', 'not asked'],
  ]);
});

test('a check-in with one answer about pain says that the other was not answered', () => {
  expect(painOf({ painNow: 5 })).toEqual([
    ['Pain now', '5'],
    ['Pain at worst', 'not answered'],
  ]);
});
