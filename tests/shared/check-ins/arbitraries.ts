import fc from 'fast-check';
import { chooseAlone, choose, toggle } from '#shared/check-ins/answering.ts';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { AskContext, CheckInMode, Screen } from '#shared/check-ins/screens.ts';
import { dangerCodes, symptomCodes } from '#shared/check-ins/symptoms.ts';
import { tree } from '#shared/check-ins/tree.ts';
import type { EarlierCheckIn } from '#shared/check-ins/usual.ts';
import { choicesFor, nextScreen, precautionChoices } from '#shared/check-ins/walk.ts';

export const someContext: AskContext = { day: 24, precautionsInForce: ['sling', 'reaching', 'lifting'] };

/** Every code that a screen of the tree can write, in the order of the tree. */
export const codesOf = (screen: Screen): string[] => {
  switch (screen.kind) {
    case 'single':
    case 'several':
      return screen.choices.map(({ code }) => code);
    case 'tiles':
      return screen.tiles.flatMap(({ choices }) => choices.map(({ code }) => code));
    case 'precautions':
      return ['reaching', 'lifting'];
    case 'scale':
    case 'temperature':
    case 'note':
      return [];
  }
};

const pain = fc.integer({ min: 0, max: 10 });
const temperature = fc.oneof(
  fc.constant('not-measured' as const),
  fc.record({ unit: fc.constant('C' as const), tenths: fc.integer({ min: 365, max: 400 }) }),
  fc.record({ unit: fc.constant('F' as const), tenths: fc.integer({ min: 970, max: 1040 }) }),
);

const anyOfScreen = (screen: Screen): fc.Arbitrary<unknown> => {
  switch (screen.kind) {
    case 'scale':
      return pain;
    case 'single':
      return fc.constantFrom(...codesOf(screen));
    case 'temperature':
      return temperature;
    case 'note':
      return fc.string({ maxLength: 40 });
    case 'several':
    case 'precautions':
    case 'tiles':
      return fc.subarray(codesOf(screen), { minLength: 0 });
  }
};

/** Any answers that the schema takes, also such that no walk through the tree would leave. */
export const anyAnswers: fc.Arbitrary<Answers> = fc.record(
  {
    ...Object.fromEntries(tree.map((screen) => [screen.key, anyOfScreen(screen)])),
    danger: fc.subarray([...dangerCodes], { maxLength: 2 }),
    // Few symptoms at a time, so that a single one is seen often enough.
    symptoms: fc.subarray([...symptomCodes], { maxLength: 4 }),
  },
  { requiredKeys: [] },
);

/** Earlier check-ins at distinct times. */
export const anyHistory: fc.Arbitrary<EarlierCheckIn[]> = fc.uniqueArray(
  fc.record({
    answeredAt: fc
      .integer({ min: 0, max: 60 * 24 })
      .map((hours) => new Date(Date.UTC(2025, 9, 1) + hours * 3_600_000).toISOString()),
    painNow: fc.option(pain),
    painWorst: fc.option(pain),
    byProxy: fc.boolean(),
  }),
  { maxLength: 8, selector: ({ answeredAt }) => answeredAt },
);

export const anyCircumstances = fc.record({
  history: anyHistory,
  day: fc.integer({ min: 0, max: 120 }),
  operationCard: fc.record({
    block: fc.constantFrom('none' as const, 'single' as const, 'long-acting' as const),
  }),
  safetyFacts: fc.record({ bloodThinner: fc.constantFrom(true, false, null) }),
  precautionsInForce: fc.subarray(['sling', 'reaching', 'lifting']),
});

/** Numbers from 0 to below 1 that are the same on every run. */
export const seededRandom = (seed: number): (() => number) => {
  let state = seed;
  return () => {
    state = (state * 1_664_525 + 1_013_904_223) % 4_294_967_296;
    return state / 4_294_967_296;
  };
};

/** Fills in a check-in by taps on what the tree offers, at random, more often well than not. */
export const walkAtRandom = (random: () => number, context: AskContext, mode: CheckInMode): Answers => {
  const pick = <T>(values: readonly T[]): T => values[Math.floor(random() * values.length)]!;
  let answers: Answers = {};
  let screen = nextScreen(null, answers, context, mode);
  while (screen !== null) {
    switch (screen.kind) {
      case 'scale':
        answers = choose(screen, answers, Math.floor(random() * 11));
        break;
      case 'single':
        answers = choose(screen, answers, pick(choicesFor(screen.choices, context)).code);
        break;
      case 'temperature': {
        const celsius = { unit: 'C' as const, tenths: 370 + Math.floor(random() * 20) };
        answers = choose(screen, answers, random() < 0.2 ? 'not-measured' : celsius);
        break;
      }
      case 'note':
        break;
      case 'several':
      case 'precautions':
      case 'tiles': {
        const offered =
          screen.kind === 'precautions'
            ? precautionChoices(context)
            : screen.kind === 'tiles'
              ? screen.tiles.flatMap(({ choices }) => choicesFor(choices, context))
              : choicesFor(screen.choices, context);
        if (random() < 0.4) answers = chooseAlone(screen, answers);
        else {
          const codes = new Set(
            Array.from({ length: 1 + Math.floor(random() * 3) }, () => pick(offered).code),
          );
          for (const code of codes) answers = toggle(screen, answers, code);
        }
      }
    }
    screen = nextScreen(screen.id, answers, context, mode);
  }
  return answers;
};
