import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { evaluate, pausesExercises } from '#shared/red-flags/evaluate.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import { findingsOf, firedBy } from './case.ts';

describe('the safety net', () => {
  test.each([
    'knock',
    'acromion-pain',
    'hand-colour',
    'hand-sweat',
    'hand-stiff',
    'wound-redness',
    'bowels',
    'call-me',
  ] as const)('%s, which no other rule grades, goes to a person on the same day', (symptom) => {
    expect(firedBy({ symptoms: [symptom] })).toEqual(['unclassified same-day']);
  });

  test.each([
    ['single', 3, 'since-surgery', []],
    ['long-acting', 3, 'since-surgery', []],
    ['single', 4, 'since-surgery', ['unclassified same-day']],
    ['none', 1, 'since-surgery', ['unclassified same-day']],
    ['single', 1, 'came-later', ['unclassified same-day']],
    ['single', 1, 'not-sure', ['unclassified same-day']],
    ['single', 1, undefined, ['unclassified same-day']],
  ] as const)('numbness, block %s, day %i, %s: %j', (block, day, numbSince, fired) => {
    const answers: Answers = { symptoms: ['hand-numb'], ...(numbSince ? { numbSince } : {}) };
    expect(firedBy(answers, { day, operationCard: { block } })).toEqual(fired);
  });

  test.each([
    ['no-different', []],
    ['other', ['unclassified same-day']],
    ['hurts-more', ['unclassified same-day']],
  ] as const)('a precaution broken and since then %s: %j', (heldOffSince, fired) => {
    expect(firedBy({ sling: ['held-off'], heldOff: ['lifting'], heldOffSince })).toEqual(fired);
  });

  test('has what a rule that a clinic has switched off would have graded', () => {
    const without = rules.map((rule) => ({ ...rule, on: rule.code !== 'pop-alone' }));
    expect(firedBy({ symptoms: ['pop-or-slip'], popSigns: ['none'] }, { rules: without })).toEqual([
      'unclassified same-day',
    ]);
  });

  test('keeps quiet about a check-in in which all is well', () => {
    const answers: Answers = {
      painNow: 2,
      painWorst: 4,
      swelling: 'less',
      dangerNone: true,
      symptomsNone: true,
    };
    expect(firedBy(answers, { usually: [2, 2, 3] })).toEqual([]);
  });
});

describe('evaluation', () => {
  test('an emergency rule cannot be switched off', () => {
    const off = rules.map((rule) => ({ ...rule, on: false }));
    expect(firedBy({ danger: ['cold-hand'], symptoms: ['no-water'] }, { rules: off })).toEqual([
      'circulation emergency',
    ]);
  });

  test('a threshold is the rule’s parameter and nothing else', () => {
    const stricter = rules.map((rule) =>
      rule.code === 'pain-severe' ? { ...rule, parameters: { nowFrom: 6, afterDay: 3 } } : rule,
    );
    expect(firedBy({ painNow: 6 }, { rules: stricter })).toEqual(['pain-severe same-day']);
  });

  test('keeps all findings, the most urgent first, with the day, the usual and what made them fire', () => {
    const answers: Answers = { painNow: 8, symptoms: ['fall'], fallSigns: ['on-arm', 'hurts-more'] };
    const found = findingsOf(answers, { day: 31, usually: [3, 3, 4] });
    expect(found.map(({ code }) => code)).toEqual(['fall-with-injury', 'fall', 'pain-severe', 'pain-rise']);
    expect(found[0]).toEqual({
      code: 'fall-with-injury',
      ruleVersion: 1,
      urgency: 'urgent',
      values: { day: 31, painNow: 8, usual: 3.33, onArm: true, signs: 'pain-up, hurts-more' },
    });
  });

  test('changes nothing that it is given, and gives the same answer twice', () => {
    const input = Object.freeze({
      answers: Object.freeze<Answers>({ painNow: 7, symptoms: ['fall'] }),
      history: Object.freeze([
        { answeredAt: '2025-11-02T08:00:00Z', painNow: 3, painWorst: null, byProxy: false },
        { answeredAt: '2025-11-01T08:00:00Z', painNow: 3, painWorst: null, byProxy: false },
      ]),
      day: 24,
      operationCard: { block: 'none' as const },
      safetyFacts: { bloodThinner: false },
      precautionsInForce: [],
      rules,
    });
    expect(evaluate(input)).toEqual(evaluate(input));
  });

  // domain.md section 4: dislocation and a fall with injury pause all, a pop alone the loading exercises.
  test.each<[string, Answers, 'all' | 'loading' | null]>([
    ['a dislocation', { symptoms: ['changed-shape'] }, 'all'],
    ['a fall with injury', { symptoms: ['fall'], fallSigns: ['hurts-more'] }, 'all'],
    ['a pop alone', { symptoms: ['pop-or-slip'] }, 'loading'],
    [
      'a pop alone and a fall with injury',
      { symptoms: ['pop-or-slip', 'fall'], fallSigns: ['hurts-more'] },
      'all',
    ],
    ['a cold hand', { danger: ['cold-hand'] }, 'all'],
    ['a fall without injury', { symptoms: ['fall'] }, null],
    ['thoughts of self-harm', { symptoms: ['low-mood'], selfHarm: 'yes' }, null],
    ['nothing', {}, null],
  ])('%s pauses exercises: %s', (_, answers, pause) => {
    expect(pausesExercises(findingsOf(answers))).toBe(pause);
  });
});
