import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { explain } from '#shared/red-flags/explain.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import { anyAnswers, anyCircumstances } from '../check-ins/arbitraries.ts';
import { findingsOf } from './case.ts';

const titleOf = (...input: Parameters<typeof findingsOf>): string => explain(findingsOf(...input)[0]!).title;

describe('a finding in words for clinicians', () => {
  test.each<[string, Answers, number[]]>([
    [
      'Fall onto the arm; pain 8, usual 3',
      { painNow: 8, symptoms: ['fall'], fallSigns: ['on-arm'] },
      [3, 3, 3],
    ],
    [
      'Fall; pain 8, usual 3; cannot stand on the legs',
      { painNow: 8, symptoms: ['fall'], fallSigns: ['cannot-stand'] },
      [3, 3, 3],
    ],
    ['Fall; hurts more since', { symptoms: ['fall'], fallSigns: ['hurts-more'] }, []],
    ['Fall onto the arm; pain 3, usual 3', { painNow: 3, symptoms: ['fall'], fallSigns: ['on-arm'] }, [3]],
    [
      'Chest pain or trouble breathing, in the last 2 days',
      { danger: ['chest-or-breathing'], chestWhen: 'last-2-days' },
      [],
    ],
    ['Chest pain or trouble breathing, time not answered', { danger: ['chest-or-breathing'] }, []],
    ['Pain 6, up 2.3 on the mean of the last 3', { painNow: 6 }, [3, 4, 4]],
    [
      'Wound fluid, color yellow, thickness thick',
      { symptoms: ['wound-fluid'], woundColour: 'yellow', woundThickness: 'thick' },
      [],
    ],
    ['Wound opened', { symptoms: ['wound-opened'] }, []],
    ['Fever 38.3 °C', { symptoms: ['hot'], temperature: { unit: 'C', tenths: 383 } }, []],
    ['Fever 101.0 °F', { symptoms: ['hot'], temperature: { unit: 'F', tenths: 1010 } }, []],
    ['Fever felt, not measured', { symptoms: ['hot'] }, []],
    ['Pop or slip; hurts much more', { symptoms: ['pop-or-slip'], popSigns: ['hurts-much-more'] }, []],
    ['Shoulder changed shape', { symptoms: ['changed-shape'] }, []],
    ['Reported: asks for a call, knock to the shoulder or arm', { symptoms: ['call-me', 'knock'] }, []],
    ['Worst pain 9, medicine does not help', { painWorst: 9, painMedicine: 'no' }, []],
  ])('%s', (title, answers, usually) => {
    expect(titleOf(answers, { usually })).toBe(title);
  });

  test('says the answer beside the usual, the day and what the rule looks for, and gives version and source apart', () => {
    const [finding] = findingsOf({ painNow: 8, symptoms: ['fall'] }, { day: 31, usually: [3, 3, 3] });
    expect(explain(finding!)).toEqual({
      title: 'Fall; pain 8, usual 3',
      sentence:
        'Day 31. Fall with pain up 2 or more or said to hurt more since, lost use, changed shape, or legs that do not bear.',
      source: 'Default of ours. The change of 2 points: Farrar et al., Pain 2001;94:149-158, from memory.',
      ruleVersion: 1,
    });
  });

  test('says pain beside the usual in the sentence where the title does not', () => {
    const [finding] = findingsOf(
      { painNow: 4, symptoms: ['hot'], temperature: { unit: 'C', tenths: 383 } },
      { day: 31, usually: [3, 3, 3] },
    );
    expect(explain(finding!).sentence).toMatch(/^Day 31\. Pain now 4, usual 3\. /);
  });

  test('leaves pain out of the sentence where it was not asked', () => {
    const [finding] = findingsOf({ symptoms: ['wound-opened'] }, { day: 31 });
    expect(explain(finding!).sentence).toBe(
      'Day 31. Fluid that is colored and thick, the published sign of pus, or the wound has opened.',
    );
  });

  test('never shows a code, a gap or a missing value', () => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        for (const finding of evaluate({ answers, ...around, rules })) {
          const { title, source } = explain(finding);
          expect(title.replace('self-harm', '')).not.toMatch(/undefined|null|NaN|[a-z]-[a-z]|; ?$|: ?$|^$/);
          expect(source).not.toBe('');
        }
      }),
      { numRuns: 500 },
    );
  });
});
