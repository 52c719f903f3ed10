import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { AnswerKey, Answers } from '#shared/check-ins/answers.ts';
import type { CheckInMode } from '#shared/check-ins/screens.ts';
import { tree } from '#shared/check-ins/tree.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { ruleCodes, type RuleCode } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import {
  anyAnswers,
  anyCircumstances,
  codesOf,
  seededRandom,
  walkAtRandom,
} from '../check-ins/arbitraries.ts';

const earlier = [{ answeredAt: '2025-11-01T08:00:00Z', painNow: 2, painWorst: 3, byProxy: false }];

/** Walks the tree by taps alone, thousands of times in an order that never changes, and collects what fires. */
const reachedIn = (mode: CheckInMode, rounds: number): Set<RuleCode> => {
  const random = seededRandom(7);
  const reached = new Set<RuleCode>();
  for (let round = 0; round < rounds && reached.size < ruleCodes.length; round += 1) {
    const precautionsInForce = ['sling', 'reaching', 'lifting'];
    const day = round % 100;
    const findings = evaluate({
      answers: walkAtRandom(random, { day, precautionsInForce }, mode),
      history: earlier,
      day,
      operationCard: { block: 'none' },
      safetyFacts: { bloodThinner: round % 2 === 0 },
      precautionsInForce,
      rules,
    });
    for (const { code } of findings) reached.add(code);
  }
  return reached;
};

describe('the question tree and the rules', () => {
  test('every rule can be reached by answering the check-in', () => {
    const reached = reachedIn('full', 40_000);
    expect(ruleCodes.filter((code) => !reached.has(code))).toEqual([]);
  }, 30_000);

  test('"something new" reaches every rule but those on pain and swelling, which it does not ask about', () => {
    const reached = reachedIn('something-new', 5_000);
    expect(ruleCodes.filter((code) => !reached.has(code))).toEqual([
      'clot-arm',
      'pain-uncontrolled',
      'pain-severe',
      'pain-rise',
    ]);
  }, 30_000);

  test('no rule reads an answer that nobody asks', () => {
    const read = new Set<string>();
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, circumstances) => {
        const watched = new Proxy(answers, {
          get: (target, key) => {
            if (typeof key === 'string') read.add(key);
            return Reflect.get(target, key) as unknown;
          },
        });
        evaluate({ answers: watched, ...circumstances, rules });
      }),
      { seed: 1, numRuns: 2000 },
    );
    const asked = new Set<string>(tree.map(({ key }) => key));
    expect([...read].filter((key) => !asked.has(key))).toEqual([]);
    expect(read.size).toBeGreaterThan(15);
  });

  const changesSomething = (key: AnswerKey): boolean => {
    const details = fc.check(
      fc.property(anyAnswers, anyAnswers, anyCircumstances, (answers, other, circumstances) => {
        const changed: Answers = { ...answers, [key]: other[key] };
        const before = evaluate({ answers, ...circumstances, rules });
        expect(evaluate({ answers: changed, ...circumstances, rules })).toEqual(before);
      }),
      { seed: 1, numRuns: 20_000, endOnFailure: true },
    );
    return details.failed;
  };

  test.each(tree.filter(({ askedFor }) => askedFor === null))(
    'the answer to $id has a consequence in some rule',
    ({ key }) => {
      expect(changesSomething(key)).toBe(true);
    },
    30_000,
  );

  test('what no rule grades says why it is asked', () => {
    const reasons = tree.filter(({ askedFor }) => askedFor !== null);
    expect(reasons.map(({ id }) => id)).toEqual(['sling', 'held-off', 'numb-where', 'review']);
    for (const { askedFor } of reasons) expect(askedFor).toMatch(/\w{3}.*\.$/);
  });

  const ticks = tree
    .filter(({ kind, askedFor }) => (kind === 'several' || kind === 'tiles') && askedFor === null)
    .flatMap((screen) => codesOf(screen).map((code) => ({ id: screen.id, key: screen.key, code })));

  test.each(ticks)(
    'ticking $code on $id makes a finding or changes what one says',
    ({ key, code }) => {
      const details = fc.check(
        fc.property(anyAnswers, anyCircumstances, (answers, circumstances) => {
          const others = ((answers[key] ?? []) as string[]).filter((other) => other !== code);
          const without: Answers = { ...answers, [key]: others };
          const withIt: Answers = { ...answers, [key]: [...others, code] };
          expect(evaluate({ answers: withIt, ...circumstances, rules })).toEqual(
            evaluate({ answers: without, ...circumstances, rules }),
          );
        }),
        { seed: 1, numRuns: 20_000, endOnFailure: true },
      );
      expect(details.failed).toBe(true);
    },
    30_000,
  );
});
