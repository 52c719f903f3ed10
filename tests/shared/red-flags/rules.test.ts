import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { evaluate, pausesExercises } from '#shared/red-flags/evaluate.ts';
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

  test.each<[string, Answers, boolean | null, string[]]>([
    ['a blow to the head', { fallSigns: ['hit-head'] }, false, ['fall same-day']],
    [
      'a blow to the head, blood thinner',
      { fallSigns: ['hit-head'] },
      true,
      ['head-injury emergency', 'fall same-day'],
    ],
    [
      'a blow to the head, thinner not recorded',
      { fallSigns: ['hit-head'] },
      null,
      ['head-injury emergency', 'fall same-day'],
    ],
    [
      'knocked out',
      { fallSigns: ['hit-head', 'knocked-out'] },
      false,
      ['head-injury emergency', 'fall same-day'],
    ],
    ['a blood thinner, no blow to the head', { fallSigns: ['on-arm'] }, true, ['fall same-day']],
    ['it hurts more', { fallSigns: ['hurts-more'] }, false, ['fall-with-injury urgent', 'fall same-day']],
    [
      'legs that do not bear',
      { fallSigns: ['cannot-stand'] },
      false,
      ['fall-with-injury urgent', 'fall same-day'],
    ],
    ['no answer about signs', {}, false, ['fall same-day']],
  ])('a fall with %s', (_, answers, bloodThinner, fired) => {
    expect(firedBy({ symptoms: ['fall'], ...answers }, { safetyFacts: { bloodThinner } })).toEqual(fired);
  });

  test.each([
    [4, null],
    [5, 'fall-with-injury'],
    [6, 'fall-with-injury'],
  ])('a fall with pain %i where 3 is usual: %s', (painNow, code) => {
    const found = findingsOf({ painNow, symptoms: ['fall'] }, { usually: [3, 3, 3] });
    expect(found.find((finding) => finding.code === 'fall-with-injury')?.code ?? null).toBe(code);
  });

  test('a fall is raised to day 90; after that the safety net has it', () => {
    expect(firedBy({ symptoms: ['fall'] }, onDay(90))).toEqual(['fall same-day']);
    expect(firedBy({ symptoms: ['fall'] }, onDay(91))).toEqual(['unclassified same-day']);
  });

  test.each<Case>([
    ['nothing else', { symptoms: ['pop-or-slip'], popSigns: ['none'] }, ['pop-alone same-day']],
    ['no answer about signs', { symptoms: ['pop-or-slip'] }, ['pop-alone same-day']],
    [
      'a different look',
      { symptoms: ['pop-or-slip'], popSigns: ['looks-different'] },
      ['dislocation urgent'],
    ],
    ['much more pain', { symptoms: ['pop-or-slip'], popSigns: ['hurts-much-more'] }, ['dislocation urgent']],
    [
      'a hand that is no longer usable',
      { symptoms: ['pop-or-slip'], popSigns: ['cannot-use-hand'] },
      ['dislocation urgent'],
    ],
    ['a changed shape', { symptoms: ['pop-or-slip', 'changed-shape'] }, ['dislocation urgent']],
    [
      'a numb or cold hand',
      { symptoms: ['pop-or-slip'], popSigns: ['hand-numb-or-cold'] },
      ['dislocation-with-nerve emergency'],
    ],
    [
      'a numb hand ticked elsewhere',
      { symptoms: ['pop-or-slip', 'hand-numb'] },
      ['dislocation-with-nerve emergency'],
    ],
    [
      'a cold hand among the danger signs',
      { danger: ['cold-hand'], symptoms: ['pop-or-slip'] },
      ['circulation emergency', 'dislocation-with-nerve emergency'],
    ],
  ])('a pop with %s', (_, answers, fired) => {
    expect(firedBy(answers)).toEqual(fired);
  });

  test('a changed shape alone is a dislocation until shown otherwise', () => {
    expect(firedBy({ symptoms: ['changed-shape'] })).toEqual(['dislocation urgent']);
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
