import { describe, expect, test } from 'vitest';
import { planContentSchema } from '#shared/plans/plan.ts';
import { reverseReplacement } from '#shared/plans/reverse-replacement.ts';
import planWords from '#src/locales/en/plan.json' with { type: 'json' };
import planDetails from '#src/locales/en/plan-details.json' with { type: 'json' };
import { readingGrade } from '../reading-grade.ts';
import { textAt } from '../words-of.ts';
import reference from './reverse-replacement.reference.json' with { type: 'json' };

/** One of each of these must stand in a protocol before it can be adopted. */
const requiredClasses = [
  ['sling'],
  ['reaching', 'active-elevation', 'passive-only'],
  ['weight-through-arm'],
  ['behind-back', 'across-behind'],
  ['lifting'],
  ['resistance'],
  ['water'],
  ['driving'],
];

/** The words of Today, and those that only the whole plan shows. */
const words = { plan: planWords, 'plan-details': planDetails };
const inDetails = ['goal', 'opens', 'did', 'why', 'steps'];
const keyOf = (path: string, part: string) =>
  `plan${inDetails.includes(part) ? '-details' : ''}:${path}.${part}`;

describe('the reverse-replacement plan that ships', () => {
  test('is a plan as the schema has it', () => {
    expect(planContentSchema.parse(reverseReplacement)).toEqual(reverseReplacement);
  });

  test('says that it is to be reviewed and that the surgeon overrides it', () => {
    expect(reverseReplacement.notice).toContain('to be reviewed by your clinicians');
    expect(reverseReplacement.notice).toContain("surgeon's own instructions win");
  });

  // domain.md section 1, common practice: Protect 0 to 6, Motion 6 to 12, Strength 12 to 16, Return from 16.
  test('has the four phases in their usual weeks', () => {
    expect(
      reverseReplacement.phases.map(({ name, usualStartWeek, usualEndWeek }) => [
        name,
        usualStartWeek,
        usualEndWeek,
      ]),
    ).toEqual([
      ['Protect', 0, 6],
      ['Motion', 6, 12],
      ['Strength', 12, 16],
      ['Return', 16, null],
    ]);
  });

  // The values, exceptions and sources are copied from the reference of starting protocols; each line of that
  // file carries its own sources.
  test('has the precautions of the reference, with its weeks, limits, exceptions and sources', () => {
    const shipped = reverseReplacement.precautions.map(
      ({
        code,
        restrictFromWeek,
        liftEarliestWeek,
        liftUsualWeek,
        exception,
        limitDegrees,
        publishedRange,
        sources,
      }) => ({
        code,
        restrictFromWeek,
        liftEarliestWeek,
        liftUsualWeek,
        exception,
        limitDegrees,
        publishedRange,
        sources,
      }),
    );
    const expected = reference.precautions.map((precaution) => ({
      code: precaution.code,
      restrictFromWeek: precaution.restrictFromWeek,
      liftEarliestWeek: precaution.liftEarliestWeek,
      liftUsualWeek: precaution.liftUsualWeek,
      exception: precaution.exception ?? null,
      limitDegrees: precaution.limitDegrees ?? null,
      publishedRange: precaution.publishedRange ?? null,
      sources: precaution.sources,
    }));
    expect(shipped).toEqual(expected);
  });

  test('has the exercises of the reference, with its doses, limits and sources', () => {
    const shipped = reverseReplacement.exercises.map(({ loadsShoulder, ...exercise }) => {
      expect(typeof loadsShoulder).toBe('boolean');
      return exercise;
    });
    const expected = reference.exercises.map((exercise) => ({
      code: exercise.code,
      name: exercise.name,
      fromWeek: exercise.fromWeek,
      usualFromWeek: exercise.usualFromWeek ?? exercise.fromWeek,
      reps: exercise.reps,
      holdSeconds: exercise.holdSeconds,
      sessionsPerDay: exercise.sessionsPerDay,
      equipment: exercise.equipment,
      substitute: exercise.substitute ?? null,
      limit: exercise.limit ?? null,
      note: exercise.note ?? null,
      sources: exercise.sources,
    }));
    expect(shipped).toEqual(expected);
  });

  test.each(requiredClasses.map((codes) => [codes.join(' or ')]))('holds %s', (codes) => {
    const shipped = reverseReplacement.precautions.map(({ code }) => code);
    expect(codes.split(' or ').some((code) => shipped.includes(code))).toBe(true);
  });

  test('nothing may be lifted before it is in force, nor fall due before it may be lifted', () => {
    for (const { restrictFromWeek, liftEarliestWeek, liftUsualWeek } of reverseReplacement.precautions) {
      expect(restrictFromWeek).toBeLessThan(liftEarliestWeek);
      expect(liftEarliestWeek).toBeLessThanOrEqual(liftUsualWeek);
    }
  });

  test('every line of the plan has its words for the patient', () => {
    const keys = [
      ...reverseReplacement.phases.flatMap(({ code, gate }) =>
        ['name', 'goal', ...(gate === null ? [] : ['opens'])].map((part) => keyOf(`phases.${code}`, part)),
      ),
      ...reverseReplacement.precautions.flatMap(({ code }) =>
        ['title', 'detail', 'did', 'why'].map((part) => keyOf(`precautions.${code}`, part)),
      ),
      ...reverseReplacement.exercises.flatMap(({ code }) =>
        ['name', 'steps'].map((part) => keyOf(`exercises.${code}`, part)),
      ),
    ];
    expect(keys.filter((key) => textAt(words, key) === null)).toEqual([]);
  });

  test.each(Object.entries(planWords.precautions))(
    'the words of %s read at grade 6 or lower',
    (code, words) => {
      const { title, detail } = words;
      const did = textAt({ 'plan-details': planDetails }, `plan-details:precautions.${code}.did`);
      const why = textAt({ 'plan-details': planDetails }, `plan-details:precautions.${code}.why`);
      expect(readingGrade(`${title}. ${detail} ${did}. ${why}`)).toBeLessThanOrEqual(6);
    },
  );

  test.each(Object.entries(planDetails.exercises))('the steps of %s read at grade 6 or lower', (_, words) => {
    expect(readingGrade(words.steps)).toBeLessThanOrEqual(6);
  });
});
