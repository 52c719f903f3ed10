import { describe, expect, it } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { tree } from '#shared/check-ins/tree.ts';
import { draftFrom } from '#src/features/check-ins/draft.ts';
import { screenAt, stepAfter, unanswered, withoutAnswer } from '#src/features/check-ins/steps.ts';
import { aDraft, inesContext } from './drafts.ts';

const allIsWell: Answers = {
  painNow: 3,
  painWorst: 4,
  swelling: 'same',
  sling: ['as-advised'],
  dangerNone: true,
  symptomsNone: true,
};
const place = (answers: Answers) => ({ answers, context: inesContext, mode: 'full' as const });
const screenOf = (id: string) => tree.find((screen) => screen.id === id)!;

describe('where an answer leads', () => {
  it('goes through seven screens when all is well, so that a check-in takes eight taps with its start', () => {
    const walked = ['pain-now'];
    for (;;) {
      const next = stepAfter(place(allIsWell), walked.at(-1)!, false);
      if (next === walked.at(-1)) break;
      walked.push(next);
    }
    expect(walked).toEqual([
      'pain-now',
      'pain-worst',
      'swelling',
      'sling',
      'danger',
      'anything-else',
      'review',
    ]);
  });

  it('asks what a worse answer asks for', () => {
    expect(stepAfter(place({ painWorst: 9 }), 'pain-worst', false)).toBe('pain-medicine');
  });

  it('goes back to the review after one answer was changed', () => {
    expect(stepAfter(place(allIsWell), 'swelling', true)).toBe('review');
  });

  it('asks the follow-ups of a changed answer before it goes back to the review', () => {
    expect(stepAfter(place({ ...allIsWell, swelling: 'more' }), 'swelling', true)).toBe('swelling-where');
  });

  it('stands at the first open question when the kept place is no longer asked', () => {
    expect(screenAt(place({ painNow: 3, painWorst: 4 }), 'pain-medicine')?.id).toBe('swelling');
  });

  it('takes back "none of these" as well as any other answer', () => {
    expect(withoutAnswer(allIsWell, screenOf('danger')).dangerNone).toBeUndefined();
    expect(withoutAnswer(allIsWell, screenOf('pain-now')).painNow).toBeUndefined();
  });

  it('counts the questions that were passed over, and never the note', () => {
    expect(unanswered(place(allIsWell))).toEqual([]);
    expect(unanswered(place({ ...allIsWell, swelling: undefined })).map(({ id }) => id)).toEqual([
      'swelling',
    ]);
  });
});

describe('a draft that was kept on the device', () => {
  it('is gone on with on the same day', () => {
    const draft = aDraft({ answers: { painNow: 3 } });
    expect(draftFrom(JSON.parse(JSON.stringify(draft)), 'full', '2026-12-01')?.answers).toEqual({
      painNow: 3,
    });
  });

  it('is left alone on another day, in the other kind of check-in, and when it is no draft', () => {
    expect(draftFrom(aDraft(), 'full', '2026-12-02')).toBeNull();
    expect(draftFrom(aDraft(), 'something-new', '2026-12-01')).toBeNull();
    expect(draftFrom({ version: 1, mode: 'full' }, 'full', '2026-12-01')).toBeNull();
    expect(draftFrom('nonsense', 'full', '2026-12-01')).toBeNull();
  });

  it('is gone on with off line, where the date is not known', () => {
    expect(draftFrom(aDraft(), 'full', null)?.id).toBe(aDraft().id);
  });
});
