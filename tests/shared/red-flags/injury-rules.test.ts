import { describe, expect, test } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { findingsOf, firedBy } from './case.ts';

type Case = [string, Answers, string[]];

const onDay = (day: number) => ({ day });

// Values are those of domain.md, section 4; the mark and the source of each stand in the rule itself.
describe('the rules on falls, pops and changed shape', () => {
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
});
