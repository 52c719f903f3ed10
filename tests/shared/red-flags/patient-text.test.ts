import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { patientTextOf } from '#shared/red-flags/patient-text.ts';
import { ruleCodes } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import ruleWords from '#src/locales/en/rules.json' with { type: 'json' };
import { anyAnswers, anyCircumstances } from '../check-ins/arbitraries.ts';
import { readingGrade, syllablesOf, wordsIn } from '../reading-grade.ts';
import { filled, textAt } from '../words-of.ts';
import { findingsOf } from './case.ts';

const files = { rules: ruleWords };
const { caution, ...blocks } = ruleWords;
const parts = ['title', 'told', 'why', 'meanwhile', 'next'] as const;
const gaps = {
  emergencyNumber: '911',
  crisisNumber: '988',
  onCallNumber: '555-0142',
  temperature: '38.3 °C',
  painNow: '7',
  painWorst: '9',
  usual: '3',
};

/** One screen of text as the patient reads it. */
const screenOf = (block: (typeof blocks)[keyof typeof blocks]): string =>
  filled(
    `${block.title}. You told us: ${block.told}. ${block.why} While you wait: ${block.meanwhile} ${block.next}`,
    gaps,
  );

/** Words of three syllables or more that these texts need. Each is the plain word for its thing. */
const hardWords = ['allergy', 'confusion', 'different', 'exercises', 'surgery', 'temperature', 'vomited'];

const textsOf = (answers: Answers, day = 24) => patientTextOf(findingsOf(answers, { day })[0]!);

describe("the rules' words for the patient", () => {
  test('every rule has a block of its own with all five parts', () => {
    for (const code of ruleCodes) {
      for (const part of parts)
        expect([code, textAt(files, `rules:${code}.${part}`)]).not.toEqual([code, null]);
    }
  });

  test('whatever is answered, the words that a finding names are there, and no gap stays open', () => {
    fc.assert(
      fc.property(anyAnswers, anyCircumstances, (answers, around) => {
        for (const finding of evaluate({ answers, ...around, rules })) {
          const { values, ...keys } = patientTextOf(finding);
          const clinic = { emergencyNumber: '911', crisisNumber: '988', onCallNumber: '555-0142' };
          for (const key of Object.values(keys)) {
            const text = textAt(files, key);
            expect([key, text]).not.toEqual([key, null]);
            const shown = filled(text!, { ...values, ...clinic });
            expect(shown).not.toMatch(/\{\{|NaN/);
          }
        }
      }),
      { numRuns: 300 },
    );
  });

  test('say what was told and nothing else', () => {
    expect(textsOf({ danger: ['chest-or-breathing'] }).told).toBe('rules:chest-or-breathing.told');
    expect(textsOf({ danger: ['fainted-or-coughed-blood'] }).told).toBe('rules:fainting.told');
    expect(textsOf({ danger: ['chest-or-breathing', 'fainted-or-coughed-blood'] }).told).toBe(
      'rules:chest-and-fainting.told',
    );
    expect(textsOf({ danger: ['chest-or-breathing'], chestWhen: 'earlier' }).title).toBe(
      'rules:chest-or-breathing-earlier.title',
    );
    expect(textsOf({ symptoms: ['low-mood'], selfHarm: 'not-sure' }).told).toBe(
      'rules:self-harm-unsure.told',
    );
    expect(textsOf({ symptoms: ['hand-weak'] }, 1).why).toBe('rules:hand-weakness-early.why');
    expect(textsOf({ symptoms: ['wound-opened'] }).told).toBe('rules:wound-opened.told');
    expect(textsOf({ symptoms: ['hot'] }).told).toBe('rules:fever-felt.told');
    expect(textsOf({ symptoms: ['hot'], temperature: { unit: 'F', tenths: 1010 } }).values.temperature).toBe(
      '101.0 °F',
    );
  });

  test.each(rules.filter(({ urgency }) => urgency === 'emergency'))(
    '$code tells the patient to call now, by the number of the place',
    ({ code }) => {
      const texts = JSON.stringify(blocks[code]);
      expect(texts).toContain(code === 'self-harm' ? '{{crisisNumber}}' : '{{emergencyNumber}}');
      expect(blocks[code].next).toMatch(/^Call first|Call first\.$/);
    },
  );

  // domain.md section 4: dislocation: sling on, nothing to eat or drink until we call.
  test('dislocation says: sling on, nothing to eat or drink until we call', () => {
    expect(blocks.dislocation.meanwhile).toContain('Keep your sling on.');
    expect(blocks.dislocation.meanwhile).toContain('nothing to eat or drink until we call');
  });

  test('none of them promises a time that nobody has looked up, or names a number outright', () => {
    for (const block of Object.values(blocks)) {
      expect(JSON.stringify(block)).not.toMatch(/\b\d+ (minutes?|hours?)\b|\btoday\b|\btomorrow\b|\b9\d\d\b/);
    }
  });

  test.each(Object.entries(blocks))('%s reads at grade 6 or lower', (_, block) => {
    expect(readingGrade(screenOf(block))).toBeLessThanOrEqual(6);
  });

  test('hard words are few, and each is listed by name', () => {
    const hard = new Set(
      Object.values(blocks)
        .flatMap((block) => wordsIn(screenOf(block)))
        .filter((word) => syllablesOf(word) >= 3)
        .map((word) => word.toLowerCase()),
    );
    expect([...hard].sort()).toEqual([...hardWords].sort());
  });

  test('the frame of a caution has its words', () => {
    expect(Object.values(caution).every((text) => text !== '')).toBe(true);
  });
});

describe('the measure of reading grade', () => {
  // A sentence with a known count: 6 words, 1 sentence, 6 syllables gives 0.39 × 6 + 11.8 − 15.59 = −1.45.
  test('gives −1.45 for six short words', () => {
    expect(readingGrade('The cat sat on the mat.')).toBeCloseTo(-1.45, 2);
  });

  test.each([
    ['water', 2],
    ['swelling', 2],
    ['exercises', 4],
    ['clothes', 1],
    ['pressed', 1],
    ['needed', 2],
    ['table', 2],
    ['temperature', 4],
  ])('%s has %i syllables', (word, count) => {
    expect(syllablesOf(word)).toBe(count);
  });
});
