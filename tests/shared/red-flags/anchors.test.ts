import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { firedBy } from './case.ts';

// The anchors stand in domain.md, section 4. Each has its source beside it: published, D = a default of ours,
// M = from memory, to be verified.
describe('the anchors of the red-flag rules', () => {
  // D; pain peaks about day 2 at 5.1 ± 2.7 in a daily-diary study of 14 days after cuff repair or arthroplasty.
  test('day 2, pain 6, swelling much more around the shoulder, nothing else: none', () => {
    const answers: Answers = {
      painNow: 6,
      painWorst: 6,
      swelling: 'much-more',
      swellingWhere: 'shoulder',
      sling: ['as-advised'],
      dangerNone: true,
      symptomsNone: true,
    };
    expect(firedBy(answers, { day: 2 })).toEqual([]);
    expect(firedBy(answers, { day: 2, usually: [3] })).toEqual([]);
  });

  // Hospital discharge instructions after shoulder surgery; CDC, signs of venous thromboembolism. 48 hours: D.
  test('day 17, chest pain this morning for ten minutes, gone: emergency', () => {
    const answers: Answers = { danger: ['chest-or-breathing'], chestWhen: 'last-2-days', symptomsNone: true };
    expect(firedBy(answers, { day: 17 })).toEqual(['chest-or-breathing emergency']);
  });

  // Falls after shoulder arthroplasty, 2020: 10.6 % fall.
  test('day 25, slid off the bed, all as before: same day', () => {
    const answers: Answers = { painNow: 3, dangerNone: true, symptoms: ['fall'], fallSigns: ['none'] };
    expect(firedBy(answers, { day: 25, usually: [3, 3, 3] })).toEqual(['fall same-day']);
  });

  // Hospital discharge instructions after shoulder surgery: 38.0 and 38.3 °C are both published, with their
  // Fahrenheit 100.4 and 101.0.
  test.each([
    ['37.9 °C', 'C', 379, []],
    ['38.0 °C', 'C', 380, ['fever same-day']],
    ['38.2 °C', 'C', 382, ['fever same-day']],
    ['38.3 °C', 'C', 383, ['fever-high urgent']],
    ['100.3 °F', 'F', 1003, []],
    ['100.4 °F', 'F', 1004, ['fever same-day']],
    ['100.9 °F', 'F', 1009, ['fever same-day']],
    ['101.0 °F', 'F', 1010, ['fever-high urgent']],
  ] as const)('%s', (_, unit, tenths, expected) => {
    const answers: Answers = { symptoms: ['hot'], temperature: { unit, tenths }, shaking: 'no' };
    expect(firedBy(answers)).toEqual(expected);
  });
});
