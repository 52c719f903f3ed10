import { describe, expect, it } from 'vitest';
import type { Answers } from '#shared/check-ins/answers.ts';
import { findingsOf, seriousOf, takeAnswers, takeBack } from '#src/features/check-ins/danger-watch.ts';
import { aDraft, countedIds, inesContext } from './drafts.ts';

const coldHand: Answers = { danger: ['cold-hand'] };

describe('what the phone does with an answer', () => {
  it('raises neither alert nor caution when all is well', () => {
    const { draft, alert } = takeAnswers(aDraft(), { painNow: 3 }, 'pain-now', countedIds());
    expect(alert).toBeNull();
    expect(draft.caution).toBeNull();
    expect(draft.answers).toEqual({ painNow: 3 });
  });

  it('sends an alert with all answers so far at the tick of a danger, and shows the caution', () => {
    const before = aDraft({ answers: { painNow: 3 } });
    const answers: Answers = { painNow: 3, danger: ['chest-or-breathing'] };
    const { draft, alert } = takeAnswers(before, answers, 'danger', countedIds());
    expect(alert).toEqual({ id: 'id-1', answers });
    expect(draft.caution).toEqual({
      alertId: 'id-1',
      answersBefore: { painNow: 3 },
      atBefore: 'danger',
    });
  });

  it('sends a further alert when another danger is ticked in the same check-in', () => {
    const newId = countedIds();
    const first = takeAnswers(aDraft(), coldHand, 'danger', newId);
    const second = takeAnswers(first.draft, { danger: ['cold-hand', 'bleeding'] }, 'danger', newId);
    expect(second.alert?.id).toBe('id-2');
    expect(second.draft.alerts.map(({ id }) => id)).toEqual(['id-1', 'id-2']);
  });

  it('sends a further alert when a second sign joins the first under the same rule', () => {
    const newId = countedIds();
    const first = takeAnswers(aDraft(), { danger: ['chest-or-breathing'] }, 'danger', newId);
    const second = takeAnswers(
      first.draft,
      { danger: ['chest-or-breathing', 'fainted-or-coughed-blood'] },
      'danger',
      newId,
    );
    expect(second.alert?.id).toBe('id-2');
  });

  it('sends nothing again when an answer makes a danger that was told less urgent', () => {
    const newId = countedIds();
    const chest = takeAnswers(aDraft(), { danger: ['chest-or-breathing'] }, 'danger', newId);
    const earlier = takeAnswers(
      { ...chest.draft, caution: null },
      { danger: ['chest-or-breathing'], chestWhen: 'earlier' },
      'chest-when',
      newId,
    );
    expect(earlier.alert).toBeNull();
    expect(earlier.draft.caution).toBeNull();
  });

  it('shows the caution again when a danger is unticked and ticked again, without a second alert', () => {
    const newId = countedIds();
    const ticked = takeAnswers(aDraft(), coldHand, 'danger', newId);
    const unticked = takeAnswers({ ...ticked.draft, caution: null }, {}, 'danger', newId);
    const again = takeAnswers(unticked.draft, coldHand, 'danger', newId);
    expect(again.alert).toBeNull();
    expect(again.draft.caution?.alertId).toBe('id-1');
  });

  it('takes the tick back when it was a mistake, and sends anew when the same is ticked later', () => {
    const newId = countedIds();
    const ticked = takeAnswers(
      aDraft({ answers: { painNow: 2 } }),
      { painNow: 2, ...coldHand },
      'danger',
      newId,
    );
    const back = takeBack(ticked.draft);
    expect(back).toMatchObject({ answers: { painNow: 2 }, at: 'danger', caution: null, alerts: [] });
    expect(takeAnswers(back, { painNow: 2, ...coldHand }, 'danger', newId).alert?.id).toBe('id-2');
  });

  it('gives changed answers an id of their own once the earlier ones were tried to send', () => {
    const before = aDraft({ answers: { painNow: 3 }, tried: true });
    const { draft } = takeAnswers(before, { painNow: 4 }, 'pain-now', countedIds());
    expect(draft.id).toBe('id-1');
    expect(draft.tried).toBe(false);
  });

  it('counts urgent findings as serious and same-day ones not', () => {
    // Domain, section 4: a pop with nothing else is the same day; a sore and swollen calf is urgent.
    const pop = findingsOf({ symptoms: ['pop-or-slip'], popSigns: ['none'] }, inesContext);
    const calf = findingsOf({ symptoms: ['calf'], calfSigns: 'both' }, inesContext);
    expect(pop.map(({ code }) => code)).toEqual(['pop-alone']);
    expect(seriousOf(pop)).toEqual([]);
    expect(seriousOf(calf).map(({ code }) => code)).toEqual(['clot-leg']);
  });
});
