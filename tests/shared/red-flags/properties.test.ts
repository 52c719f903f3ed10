import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { pruneAnswers } from '#shared/check-ins/answering.ts';
import type { Answers, Temperature } from '#shared/check-ins/answers.ts';
import type { Screen } from '#shared/check-ins/screens.ts';
import { tree } from '#shared/check-ins/tree.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { highestUrgency, urgencies, type Urgency } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import { anyAnswers, anyCircumstances, codesOf } from '../check-ins/arbitraries.ts';

type Circumstances = typeof anyCircumstances extends fc.Arbitrary<infer T> ? T : never;

const runs = { numRuns: 250 };
/** 0 is none, 4 an emergency. */
const height = (urgency: Urgency | null): number =>
  urgency === null ? 0 : urgencies.length - urgencies.indexOf(urgency);
const heightOf = (answers: Answers, circumstances: Circumstances): number =>
  height(highestUrgency(evaluate({ answers, ...circumstances, rules })));

/** Two answers to the same screen, the first at most as bad as the second by the order that the tree declares. */
const milderAndWorse = (screen: Screen): fc.Arbitrary<[unknown, unknown]> => {
  const inOrder = (values: readonly unknown[]): fc.Arbitrary<[unknown, unknown]> =>
    fc
      .tuple(fc.nat({ max: values.length - 1 }), fc.nat({ max: values.length - 1 }))
      .map(([a, b]) => [values[Math.min(a, b)], values[Math.max(a, b)]]);
  switch (screen.kind) {
    case 'scale':
      return inOrder([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    case 'single':
      return inOrder(screen.severity);
    case 'temperature':
      return fc
        .constantFrom<[Temperature['unit'], number]>(['C', 375], ['F', 998])
        .chain(([unit, from]) => inOrder(Array.from({ length: 15 }, (_, i) => ({ unit, tenths: from + i }))));
    case 'note':
      return fc.constant(['', 'words']);
    case 'several':
    case 'precautions':
    case 'tiles': {
      const alone = [screen.alone.noneKey ? [] : [screen.alone.code], []].flat();
      return fc
        .tuple(fc.subarray(codesOf(screen)), fc.subarray(codesOf(screen)))
        .map(([some, more]) => [some.length > 0 ? some : alone, [...new Set([...some, ...more])]]);
    }
  }
};

const mildest = (screen: Screen): unknown => {
  switch (screen.kind) {
    case 'scale':
      return 0;
    case 'single':
      return screen.severity[0];
    case 'temperature':
      return { unit: 'C', tenths: 300 };
    case 'note':
      return '';
    case 'several':
    case 'precautions':
    case 'tiles':
      return [];
  }
};

const without = (answers: Answers, key: string): Answers =>
  Object.fromEntries(Object.entries(answers).filter(([other]) => other !== key));

describe('urgency', () => {
  test.each(tree)('a worse answer to $id never gives a lower one', (screen) => {
    fc.assert(
      fc.property(
        anyAnswers,
        milderAndWorse(screen),
        anyCircumstances,
        (answers, [milder, worse], around) => {
          const before = heightOf({ ...answers, [screen.key]: milder }, around);
          expect(heightOf({ ...answers, [screen.key]: worse }, around)).toBeGreaterThanOrEqual(before);
        },
      ),
      runs,
    );
  });

  // What a missing answer would have been is unknown, so it cannot be held to the worst; it is held to count
  // for at least as much as the mildest that could have been given.
  test.each(tree)('leaving $id unanswered is never lower than its mildest answer', (screen) => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        const floor = heightOf({ ...answers, [screen.key]: mildest(screen) }, around);
        expect(heightOf(without(answers, screen.key), around)).toBeGreaterThanOrEqual(floor);
      }),
      runs,
    );
  });

  test.each(['chestWhen', 'faintedWhen', 'numbSince'])(
    'leaving out the time (%s) counts as the worst time there is',
    (key) => {
      fc.assert(
        fc.property(anyAnswers, anyCircumstances, (answers, around) => {
          expect(heightOf(without(answers, key), around)).toBeGreaterThanOrEqual(heightOf(answers, around));
        }),
        runs,
      );
    },
  );

  test.each(
    tree.filter(
      (screen) =>
        screen.kind === 'single' && screen.askedFor === null && codesOf(screen).includes('not-sure'),
    ),
  )('"not sure" about $id counts for as much as the worst answer, or more', (screen) => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        const worst = screen.kind === 'single' ? screen.severity.at(-1) : null;
        const atWorst = heightOf({ ...answers, [screen.key]: worst }, around);
        expect(heightOf({ ...answers, [screen.key]: 'not-sure' }, around)).toBeGreaterThanOrEqual(atWorst);
      }),
      runs,
    );
  });
});

describe('evaluation', () => {
  test('does not depend on the order in which earlier check-ins come', () => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, fc.nat(), (answers, around, turn) => {
        const { history } = around;
        const at = history.length === 0 ? 0 : turn % history.length;
        const turned = [...history.slice(at), ...history.slice(0, at)].reverse();
        expect(evaluate({ answers, ...around, history: turned, rules })).toEqual(
          evaluate({ answers, ...around, rules }),
        );
      }),
      runs,
    );
  });

  test('takes no account of an answer whose question is no longer asked', () => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        expect(evaluate({ answers: pruneAnswers(answers), ...around, rules })).toEqual(
          evaluate({ answers, ...around, rules }),
        );
      }),
      runs,
    );
  });

  test('leaves no symptom that somebody ticked without a finding, but for the expected ones', () => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        const expected = ['hand-numb', 'hand-tingling', 'hot', 'chills'];
        const ticked = (answers.symptoms ?? []).filter((symptom) => !expected.includes(symptom));
        if (ticked.length === 0) return;
        expect(heightOf(answers, around)).toBeGreaterThanOrEqual(height('same-day'));
      }),
      runs,
    );
  });
});
