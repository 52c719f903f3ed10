import { describe, expect, test } from 'vitest';
import { answersSchema, type AnswerKey } from '#shared/check-ins/answers.ts';
import { dangerCodes, symptomCodes } from '#shared/check-ins/symptoms.ts';
import type { Screen } from '#shared/check-ins/screens.ts';
import { tree } from '#shared/check-ins/tree.ts';
import checkInWords from '#src/locales/en/check-in.json' with { type: 'json' };
import { codesOf } from './arbitraries.ts';
import { readingGrade, syllablesOf, wordsIn } from '../reading-grade.ts';
import { filled, textAt } from '../words-of.ts';

describe('the question tree', () => {
  test('each screen has an id of its own', () => {
    expect(new Set(tree.map(({ id }) => id)).size).toBe(tree.length);
  });

  // domain.md section 3.
  test('the screens come in the order of the check-in, each follow-up behind what it follows', () => {
    expect(tree.filter(({ when }) => when.length === 0).map(({ id }) => id)).toEqual([
      'pain-now',
      'pain-worst',
      'swelling',
      'sling',
      'danger',
      'anything-else',
      'review',
    ]);
    for (const [index, { when }] of tree.entries()) {
      const keysBefore = tree.slice(0, index).map(({ key }): AnswerKey => key);
      for (const condition of when) {
        expect(keysBefore).toContain('not' in condition ? 'painWorst' : condition.key);
      }
    }
  });

  test('the seven danger signs are asked in their order, and "none of these" stands after them', () => {
    const danger = tree.find(({ id }) => id === 'danger')!;
    expect(codesOf(danger)).toEqual([...dangerCodes]);
    expect(danger).toMatchObject({ alone: { place: 'last', noneKey: 'dangerNone' } });
  });

  test('five tiles hold every symptom once', () => {
    const anythingElse = tree.find(({ id }) => id === 'anything-else')!;
    expect(anythingElse.kind === 'tiles' && anythingElse.tiles.length).toBe(5);
    expect(codesOf(anythingElse)).toEqual([...symptomCodes]);
    expect(new Set(symptomCodes).size).toBe(symptomCodes.length);
  });

  test('every question of the answers is asked, and nothing is asked that the answers cannot hold', () => {
    const asked = new Set<string>(tree.map(({ key }) => key));
    for (const screen of tree) if ('alone' in screen) asked.add(screen.alone.noneKey ?? screen.key);
    expect([...asked].sort()).toEqual(Object.keys(answersSchema.shape).sort());
  });

  test.each(tree.filter(({ kind }) => kind !== 'scale' && kind !== 'note' && kind !== 'temperature'))(
    'every choice of $id is one that the answers take',
    (screen) => {
      for (const code of codesOf(screen)) {
        const value = screen.kind === 'single' ? code : [code];
        expect(answersSchema.safeParse({ [screen.key]: value }).error).toBeUndefined();
      }
      if ('alone' in screen) {
        const { noneKey, code } = screen.alone;
        const written = noneKey ? { [noneKey]: true } : { [screen.key]: [code] };
        expect(answersSchema.safeParse(written).error).toBeUndefined();
      }
    },
  );

  test.each(tree.filter((screen) => screen.kind === 'single'))(
    'the order of severity of $id holds each of its choices once',
    (screen) => {
      expect([...screen.severity].sort()).toEqual(codesOf(screen).sort());
    },
  );

  test('every text that the tree names is there', () => {
    const keys = tree.flatMap((screen) => [
      screen.titleKey,
      ...(screen.hintKey ? [screen.hintKey] : []),
      ...('choices' in screen ? screen.choices.map(({ textKey }) => textKey) : []),
      ...('alone' in screen ? [screen.alone.textKey] : []),
      ...(screen.kind === 'temperature' ? [screen.notMeasuredKey] : []),
      ...(screen.kind === 'tiles'
        ? screen.tiles.flatMap(({ textKey, examplesKey, choices }) => [
            textKey,
            examplesKey,
            ...choices.map((choice) => choice.textKey),
          ])
        : []),
    ]);
    expect(keys.filter((key) => textAt({ 'check-in': checkInWords }, key) === null)).toEqual([]);
  });

  const sentencesOn = (screen: Screen): string => {
    const keys = [screen.titleKey, ...(screen.hintKey ? [screen.hintKey] : [])];
    const choices =
      screen.kind === 'tiles'
        ? screen.tiles.flatMap((tile) => [
            tile.textKey,
            tile.examplesKey,
            ...tile.choices.map(({ textKey }) => textKey),
          ])
        : 'choices' in screen
          ? screen.choices.map(({ textKey }) => textKey)
          : [];
    return [...keys, ...choices]
      .map((key) =>
        filled(textAt({ 'check-in': checkInWords }, key) ?? '', {
          since: 'since Friday',
          crisisNumber: '988',
        }),
      )
      .map((text) => (/[.?!]$/.test(text) ? text : `${text}.`))
      .join(' ');
  };

  test.each(tree)('the words of $id read at grade 6 or lower', (screen) => {
    expect(readingGrade(sentencesOn(screen))).toBeLessThanOrEqual(6);
  });

  // Words of three syllables or more, each the plain word for its thing.
  test('the hard words of the questions are few, and each is listed by name', () => {
    const hard = tree
      .flatMap((screen) => wordsIn(sentencesOn(screen)))
      .filter((word) => syllablesOf(word) >= 3);
    expect([...new Set(hard.map((word) => word.toLowerCase()))].sort()).toEqual([
      'anything',
      'confusion',
      'different',
      'medicine',
      'surgery',
      'temperature',
      'vomited',
    ]);
  });
});
