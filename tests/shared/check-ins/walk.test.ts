import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  choose,
  chooseAlone,
  isAnswered,
  isComplete,
  pruneAnswers,
  tickedIn,
  toggle,
} from '#shared/check-ins/answering.ts';
import { answersSchema, type Answers } from '#shared/check-ins/answers.ts';
import type { AskContext, Screen, TickScreen } from '#shared/check-ins/screens.ts';
import { tree } from '#shared/check-ins/tree.ts';
import {
  choicesFor,
  nextScreen,
  precautionChoices,
  previousScreen,
  screensFor,
  secondsLeft,
} from '#shared/check-ins/walk.ts';
import { anyAnswers, seededRandom, someContext, walkAtRandom } from './arbitraries.ts';

const screen = (id: string): Screen => tree.find((candidate) => candidate.id === id)!;
const list = (id: string): TickScreen => {
  const found = screen(id);
  if (!('alone' in found)) throw new Error(`${id} is no list`);
  return found;
};
const idsFor = (answers: Answers, context = someContext): string[] =>
  screensFor(answers, context, 'full').map(({ id }) => id);

/** One tap a screen: the answer of somebody who is well. */
const tapWell = (current: Screen, answers: Answers): Answers => {
  if (current.kind === 'scale') return choose(current, answers, 2);
  if (current.kind === 'single') return choose(current, answers, 'same');
  if ('alone' in current) return chooseAlone(current, answers);
  return answers;
};

describe('walking through a check-in', () => {
  // domain.md section 3: nine taps when all is well, eight until exercises are asked about.
  test('all is well in eight taps: one to start, one a screen, the last of them sends', () => {
    let taps = 1;
    let answers: Answers = {};
    for (let at = nextScreen(null, answers, someContext, 'full'); at;) {
      answers = tapWell(at, answers);
      taps += 1;
      expect(isAnswered(at, answers)).toBe(true);
      at = nextScreen(at.id, answers, someContext, 'full');
    }
    expect(taps).toBe(8);
    expect(isComplete(answers, someContext, 'full')).toBe(true);
    expect(answers).toEqual({
      painNow: 2,
      painWorst: 2,
      swelling: 'same',
      sling: ['as-advised'],
      dangerNone: true,
      symptomsNone: true,
    });
  });

  test('something new asks about symptoms alone', () => {
    expect(screensFor({}, someContext, 'something-new').map(({ id }) => id)).toEqual([
      'danger',
      'anything-else',
      'review',
    ]);
    const answers: Answers = { danger: ['chest-or-breathing'], symptoms: ['fall'] };
    expect(screensFor(answers, someContext, 'something-new').map(({ id }) => id)).toEqual([
      'danger',
      'chest-when',
      'anything-else',
      'fall-signs',
      'review',
    ]);
  });

  test.each<[Answers, string]>([
    [{ painWorst: 9 }, 'pain-medicine'],
    [{ swelling: 'more' }, 'swelling-where'],
    [{ swelling: 'much-more', swellingWhere: 'whole-arm' }, 'swelling-colour'],
    [{ sling: ['held-off'] }, 'held-off'],
    [{ sling: ['held-off'] }, 'held-off-since'],
    [{ danger: ['chest-or-breathing'] }, 'chest-when'],
    [{ danger: ['fainted-or-coughed-blood'] }, 'fainted-when'],
    [{ symptoms: ['pop-or-slip'] }, 'pop-signs'],
    [{ symptoms: ['fall'] }, 'fall-signs'],
    [{ symptoms: ['tight-forearm'] }, 'forearm-medicine'],
    [{ symptoms: ['hand-numb'] }, 'numb-where'],
    [{ symptoms: ['hand-tingling'] }, 'numb-since'],
    [{ symptoms: ['wound-fluid'] }, 'wound-colour'],
    [{ symptoms: ['wet-dressing'] }, 'wound-thickness'],
    [{ symptoms: ['wet-dressing'] }, 'wound-signs'],
    [{ symptoms: ['hot'] }, 'temperature'],
    [{ symptoms: ['chills'] }, 'shaking'],
    [{ symptoms: ['calf'] }, 'calf-signs'],
    [{ symptoms: ['low-mood'] }, 'self-harm'],
  ])('%j asks %s, which nobody is asked otherwise', (answers, id) => {
    expect(idsFor(answers)).toContain(id);
    expect(idsFor({})).not.toContain(id);
  });

  test('whether medicine helps is asked once, however it came to be asked', () => {
    const askers = idsFor({ painWorst: 10, symptoms: ['tight-forearm'] }).filter((id) =>
      id.endsWith('medicine'),
    );
    expect(askers).toEqual(['pain-medicine']);
  });

  test('a list with one choice that excludes the rest: it is refused while something is ticked', () => {
    const danger = list('danger');
    const ticked = toggle(danger, {}, 'bleeding');
    expect(chooseAlone(danger, ticked)).toEqual({ danger: ['bleeding'] });
    expect(tickedIn(danger, ticked)).toEqual(['bleeding']);
    expect(chooseAlone(danger, toggle(danger, ticked, 'bleeding'))).toEqual({ dangerNone: true });
  });

  test('ticking something takes "none of these" and "as advised" back', () => {
    expect(toggle(list('danger'), { dangerNone: true }, 'bleeding')).toEqual({ danger: ['bleeding'] });
    expect(toggle(list('sling'), { sling: ['as-advised'] }, 'slept-without')).toEqual({
      sling: ['slept-without'],
    });
    expect(toggle(list('fall-signs'), { symptoms: ['fall'], fallSigns: ['none'] }, 'hit-head')).toEqual({
      symptoms: ['fall'],
      fallSigns: ['hit-head'],
    });
  });

  test('unticking a symptom drops the answers to its follow-ups', () => {
    const answers: Answers = { symptoms: ['fall', 'hot'], fallSigns: ['hit-head'], shaking: 'no' };
    expect(toggle(list('anything-else'), answers, 'fall')).toEqual({ symptoms: ['hot'], shaking: 'no' });
  });

  test('the hold-off choices are the precautions in force but for the sling, which is asked about itself', () => {
    expect(precautionChoices(someContext)).toEqual([
      { code: 'reaching', textKey: 'plan-details:precautions.reaching.did' },
      { code: 'lifting', textKey: 'plan-details:precautions.lifting.did' },
    ]);
  });

  test('the sling is asked about only while it is prescribed, and the screen goes with the last precaution', () => {
    const slingScreen = screen('sling');
    if (slingScreen.kind !== 'several') throw new Error('the sling screen is a list');
    const offered = (context: AskContext): string[] =>
      choicesFor(slingScreen.choices, context).map(({ code }) => code);
    expect(offered({ day: 50, precautionsInForce: ['lifting'] })).toEqual(['held-off']);
    expect(offered({ day: 50, precautionsInForce: ['sling'] })).toEqual(['sling-off-more', 'slept-without']);
    expect(idsFor({}, { day: 100, precautionsInForce: [] })).not.toContain('sling');
  });

  // domain.md section 3: from week 3 colour, sweat or stiffness.
  test('colour, sweat and stiffness of the hand are offered from day 21 on', () => {
    const anythingElse = screen('anything-else');
    if (anythingElse.kind !== 'tiles') throw new Error('anything else is tiles');
    const hand = anythingElse.tiles.find(({ code }) => code === 'hand')!;
    expect(choicesFor(hand.choices, { ...someContext, day: 20 })).toHaveLength(3);
    expect(choicesFor(hand.choices, { ...someContext, day: 21 })).toHaveLength(6);
  });

  test('back leads to where one came from', () => {
    const answers: Answers = { painWorst: 9 };
    expect(previousScreen('swelling', answers, someContext, 'full')?.id).toBe('pain-medicine');
    expect(previousScreen('swelling', {}, someContext, 'full')?.id).toBe('pain-worst');
    expect(previousScreen('pain-now', {}, someContext, 'full')).toBeNull();
    expect(nextScreen('review', {}, someContext, 'full')).toBeNull();
  });

  test('the seconds left start under a minute, fall with every screen and grow with a follow-up', () => {
    const left = screensFor({}, someContext, 'full').map(({ id }) =>
      secondsLeft(id, {}, someContext, 'full'),
    );
    expect(left[0]).toBeLessThanOrEqual(60);
    expect(left).toEqual([...left].sort((a, b) => b - a));
    expect(left.at(-1)).toBe(5);
    expect(secondsLeft('danger', { symptoms: ['hot'] }, someContext, 'full')).toBeGreaterThan(
      secondsLeft('danger', {}, someContext, 'full'),
    );
  });

  test('whatever is tapped, the answers are complete, pruned and such that the server takes them', () => {
    const random = seededRandom(1);
    for (let round = 0; round < 500; round += 1) {
      const mode = round % 2 === 0 ? 'full' : 'something-new';
      const answers = walkAtRandom(random, { ...someContext, day: round % 60 }, mode);
      expect(answersSchema.safeParse(answers).error).toBeUndefined();
      expect(pruneAnswers(answers)).toEqual(answers);
      expect(isComplete(answers, someContext, mode)).toBe(true);
    }
  });

  test('pruning twice is pruning once, and leaves no answer to a question that is not asked', () => {
    fc.assert(
      fc.property(anyAnswers, (answers) => {
        const pruned = pruneAnswers(answers);
        expect(pruneAnswers(pruned)).toEqual(pruned);
        const asked = screensFor(pruned, someContext, 'full').map(({ key }): string => key);
        expect(Object.keys(pruned).filter((key) => !asked.includes(key))).toEqual([]);
      }),
    );
  });
});
