import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { ruleCodes } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import { findingsOf, firedBy, urgencyOf } from './case.ts';

type Case = [string, Answers, string[]];

const onDay = (day: number) => ({ day });

// Values are those of domain.md, section 4; the mark and the source of each stand in the rule itself.
describe('the rules', () => {
  test('stand in the order in which findings of one urgency are shown, the safety net last', () => {
    expect(rules.map(({ code }) => code)).toEqual(ruleCodes);
  });

  test('are plain data but for what detects', () => {
    for (const rule of rules) {
      const data = Object.fromEntries(Object.entries(rule).filter(([name]) => name !== 'detect'));
      expect(JSON.parse(JSON.stringify(rule))).toEqual(data);
    }
  });

  test('each carries its source, its text for clinicians and five to seven questions to ask', () => {
    for (const { code, source, clinicianText, callSheet } of rules) {
      expect([code, source.length > 0, clinicianText.length > 0]).toEqual([code, true, true]);
      expect([5, 6, 7]).toContain(callSheet.length);
    }
  });

  test.each<Case>([
    [
      'chest pain now',
      { danger: ['chest-or-breathing'], chestWhen: 'now' },
      ['chest-or-breathing emergency'],
    ],
    [
      'chest pain longer ago than 48 hours',
      { danger: ['chest-or-breathing'], chestWhen: 'earlier' },
      ['chest-or-breathing urgent'],
    ],
    [
      'chest pain without a time, which counts as now',
      { danger: ['chest-or-breathing'] },
      ['chest-or-breathing emergency'],
    ],
    [
      'fainted in the last 2 days',
      { danger: ['fainted-or-coughed-blood'], faintedWhen: 'last-2-days' },
      ['chest-or-breathing emergency'],
    ],
    [
      'chest pain earlier but fainted now',
      {
        danger: ['chest-or-breathing', 'fainted-or-coughed-blood'],
        chestWhen: 'earlier',
        faintedWhen: 'now',
      },
      ['chest-or-breathing emergency'],
    ],
    ['confusion or stroke', { danger: ['confusion-or-stroke'] }, ['stroke-or-confusion emergency']],
    ['cold hand', { danger: ['cold-hand'] }, ['circulation emergency']],
    ['hard to wake', { danger: ['hard-to-wake'] }, ['sedation emergency']],
    ['swelling of face or throat', { danger: ['face-or-throat'] }, ['allergy emergency']],
    ['bleeding', { danger: ['bleeding'] }, ['bleeding emergency']],
    ['cannot keep fluids down', { symptoms: ['no-fluids'] }, ['fluids urgent']],
    ['cannot pass water', { symptoms: ['no-water'] }, ['water urgent']],
  ])('%s', (_, answers, fired) => {
    expect(firedBy(answers)).toEqual(fired);
  });

  test.each<Case>([
    ['nothing else', { symptoms: ['tight-forearm'], painMedicine: 'yes' }, ['unclassified same-day']],
    [
      'medicine that helps a little',
      { symptoms: ['tight-forearm'], painMedicine: 'a-little' },
      ['unclassified same-day'],
    ],
    [
      'pain that medicine does not touch',
      { symptoms: ['tight-forearm'], painMedicine: 'no' },
      ['compartment emergency'],
    ],
    [
      'not sure about medicine',
      { symptoms: ['tight-forearm'], painMedicine: 'not-sure' },
      ['compartment emergency'],
    ],
    ['a numb hand', { symptoms: ['tight-forearm', 'hand-numb'] }, ['compartment emergency']],
    ['a tingling hand', { symptoms: ['tight-forearm', 'hand-tingling'] }, ['compartment emergency']],
    [
      'a weak hand',
      { symptoms: ['tight-forearm', 'hand-weak'] },
      ['compartment emergency', 'hand-weakness urgent'],
    ],
  ])('a tight forearm with %s', (_, answers, fired) => {
    expect(firedBy(answers)).toEqual(fired);
  });

  const feverAndFaint = (tenths: number, shaking: 'yes' | 'no' | 'not-sure' | undefined): Answers => ({
    danger: ['fainted-or-coughed-blood'],
    faintedWhen: 'earlier',
    symptoms: ['chills'],
    temperature: { unit: 'C', tenths },
    ...(shaking ? { shaking } : {}),
  });

  test.each([
    ['38.0 °C, shaking and faint', feverAndFaint(380, 'yes'), true],
    ['38.0 °C, not sure of shaking, and faint', feverAndFaint(380, 'not-sure'), true],
    ['38.0 °C and faint, no shaking', feverAndFaint(380, 'no'), false],
    ['37.9 °C, shaking and faint', feverAndFaint(379, 'yes'), false],
    ['38.0 °C and shaking, not faint', { ...feverAndFaint(380, 'yes'), danger: [] }, false],
    ['not measured, shaking and faint', { ...feverAndFaint(380, 'yes'), temperature: 'not-measured' }, true],
  ] satisfies [string, Answers, boolean][])('possible sepsis: %s', (_, answers, fires) => {
    expect(findingsOf(answers).some(({ code }) => code === 'possible-sepsis')).toBe(fires);
  });

  test.each([
    [0, 'same-day'],
    [2, 'same-day'],
    [3, 'urgent'],
    [4, 'urgent'],
  ])('a weak hand on day %i is %s', (day, urgency) => {
    expect(firedBy({ symptoms: ['hand-weak'] }, onDay(day))).toEqual([`hand-weakness ${urgency}`]);
  });

  test.each([
    ['yellow', 'thick', 'urgent'],
    ['green', 'thick', 'urgent'],
    ['cloudy', 'thick', 'urgent'],
    ['yellow', 'not-sure', 'urgent'],
    ['not-sure', 'thick', 'urgent'],
    ['yellow', 'thin', 'same-day'],
    ['not-sure', 'thin', 'same-day'],
    ['clear', 'thick', 'same-day'],
    ['red', 'thick', 'same-day'],
    ['clear', 'thin', 'same-day'],
  ] as const)('wound fluid, %s and %s, is %s', (woundColour, woundThickness, urgency) => {
    for (const symptom of ['wound-fluid', 'wet-dressing'] as const) {
      expect(urgencyOf({ symptoms: [symptom], woundColour, woundThickness })).toBe(urgency);
    }
  });

  test('a wound that opened is urgent, wherever it was ticked', () => {
    expect(firedBy({ symptoms: ['wound-opened'] })).toEqual(['wound-pus urgent']);
    expect(firedBy({ symptoms: ['wet-dressing'], woundSigns: ['opened'] })).toEqual(['wound-pus urgent']);
  });

  test.each<[string, Answers, number, number[], string[]]>([
    [
      'tight or coloured, even on day 1',
      { swelling: 'more', swellingColour: 'yes' },
      1,
      [],
      ['clot-arm urgent'],
    ],
    ['perhaps coloured', { swelling: 'more', swellingColour: 'not-sure' }, 2, [], ['clot-arm urgent']],
    ['on day 6, nothing else', { swelling: 'much-more', swellingColour: 'no' }, 6, [], []],
    ['on day 7, nothing else', { swelling: 'more', swellingColour: 'no' }, 7, [], ['unclassified same-day']],
    [
      'much more on day 7',
      { swelling: 'much-more', swellingColour: 'no' },
      7,
      [],
      ['clot-arm urgent', 'unclassified same-day'],
    ],
    [
      'pain up 2 on day 4',
      { swelling: 'more', swellingColour: 'no', painNow: 4 },
      4,
      [2, 2, 2],
      ['clot-arm urgent'],
    ],
    ['pain up 1 on day 4', { swelling: 'more', swellingColour: 'no', painNow: 3 }, 4, [2, 2, 2], []],
    ['pain up 2 on day 3', { swelling: 'more', swellingColour: 'no', painNow: 4 }, 3, [2, 2, 2], []],
  ])('the whole arm swollen: %s', (_, answers, day, usually, fired) => {
    expect(firedBy({ swellingWhere: 'whole-arm', ...answers }, { day, usually })).toEqual(fired);
  });

  test.each([
    ['sore', 'unclassified same-day'],
    ['swollen', 'unclassified same-day'],
    ['both', 'clot-leg urgent'],
  ] as const)('a calf that is %s: %s', (calfSigns, fired) => {
    expect(firedBy({ symptoms: ['calf'], calfSigns })).toEqual([fired]);
  });

  test.each([
    [8, 'no', null],
    [9, 'no', 'urgent'],
    [10, 'not-sure', 'urgent'],
    [9, 'a-little', null],
    [9, 'none-taken', null],
    [9, 'yes', null],
  ] as const)('worst pain %i, does medicine help: %s: %s', (painWorst, painMedicine, urgency) => {
    expect(urgencyOf({ painWorst, painMedicine })).toBe(urgency);
  });

  test.each([
    [6, 4, []],
    [7, 3, []],
    [7, 4, ['pain-severe same-day']],
    [8, 4, ['pain-severe same-day']],
  ])('pain now %i on day %i: %j', (painNow, day, fired) => {
    expect(firedBy({ painNow }, { day })).toEqual(fired);
  });

  test.each<[string, number, number[], number, string[]]>([
    ['5, usual 3, day 4', 5, [3, 3, 3], 4, ['pain-rise same-day']],
    ['5, usual 3, day 3', 5, [3, 3, 3], 3, []],
    ['4, usual 2: below 5', 4, [2, 2, 2], 24, []],
    ['5, usual 3.33', 5, [3, 3, 4], 24, []],
    ['6, usual 3.67', 6, [3, 4, 4], 24, ['pain-rise same-day']],
    ['5 after a single check-in with 3', 5, [3], 24, ['pain-rise same-day']],
    ['5 with no check-in before: not judged', 5, [], 24, []],
    ['5 where only the last three are usual', 5, [9, 3, 3, 3], 24, ['pain-rise same-day']],
  ])('pain %s', (_, painNow, usually, day, fired) => {
    expect(firedBy({ painNow }, { day, usually })).toEqual(fired);
  });

  test.each([
    ['yes', 'self-harm emergency'],
    ['not-sure', 'self-harm emergency'],
    ['no', 'unclassified same-day'],
  ] as const)('feeling low, thoughts of self-harm %s: %s', (selfHarm, fired) => {
    expect(firedBy({ symptoms: ['low-mood'], selfHarm })).toEqual([fired]);
  });

  test('a fever felt and not measured, or not answered, is same day', () => {
    expect(firedBy({ symptoms: ['hot'], temperature: 'not-measured' })).toEqual(['fever same-day']);
    expect(firedBy({ symptoms: ['chills'] })).toEqual(['fever same-day']);
  });

  test('shaking goes to a person although the thermometer shows no fever', () => {
    const answers: Answers = {
      symptoms: ['chills'],
      temperature: { unit: 'C', tenths: 375 },
      shaking: 'yes',
    };
    expect(firedBy(answers)).toEqual(['unclassified same-day']);
  });
});
