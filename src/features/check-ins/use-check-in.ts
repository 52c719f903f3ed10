import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState, useSyncExternalStore } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInReceipt } from '#shared/check-ins/contract.ts';
import type { Screen } from '#shared/check-ins/screens.ts';
import { previousScreen } from '#shared/check-ins/walk.ts';
import { rulesVersion } from '#shared/red-flags/rules/shipped.ts';
import { useKeeper } from '#src/app/caring.ts';
import { useMe } from '#src/app/session.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { dropFromDevice, keepOnDevice } from '#src/lib/device-store.ts';
import { serverNow } from '#src/lib/server-clock.ts';
import { alertOutboxOf } from './alert-outbox-of.ts';
import { takeAnswers, takeBack } from './danger-watch.ts';
import type { CheckInDraft } from './draft.ts';
import { keptNames, storeOf } from './kept.ts';
import { usePostCheckIn } from './queries.ts';
import { screenAt, stepAfter, withoutAnswer } from './steps.ts';

const newId = () => crypto.randomUUID();

/** Where a step of the history stands; `pushed` when it came from a step before it. */
type Step = { at: string; pushed: boolean };

function stepOf(state: unknown): Step | null {
  if (typeof state !== 'object' || state === null || !('at' in state)) return null;
  return typeof state.at === 'string'
    ? { at: state.at, pushed: 'pushed' in state && state.pushed === true }
    : null;
}

/**
 * A check-in under way: its answers, its place and what can be done with it. Each step is an entry of the
 * browser's history, so that the phone's own "back" goes to the question before; the place stands in the
 * entry's state and never in the address, which servers log.
 */
export function useCheckIn(start: CheckInDraft) {
  const me = useMe();
  const { recordId } = useKeeper();
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const location = useLocation();
  const [draft, setDraft] = useState(start);
  const [receipt, setReceipt] = useState<CheckInReceipt | null>(null);
  const [takenBack, setTakenBack] = useState(false);
  const post = usePostCheckIn(recordId);
  const outbox = alertOutboxOf(me, recordId, queryClient);
  const alerts = useSyncExternalStore(outbox.subscribe, outbox.entries);

  const step = stepOf(location.state);
  const screen = screenAt(draft, step?.at ?? draft.at);
  const at = screen?.id ?? draft.at;
  const begun = Object.keys(draft.answers).length > 0;
  useBusyWhile(begun && !receipt);

  useEffect(() => {
    // The first entry gets its place too, or going back to it would not know where it stood.
    if (!stepOf(location.state)) void navigate('.', { replace: true, state: { at, pushed: false } });
  }, [navigate, location.state, at]);

  function save(next: CheckInDraft) {
    keepOnDevice(storeOf(me, recordId), keptNames.draft[next.mode], next);
    setDraft(next);
    setTakenBack(false);
  }
  function goTo(to: string, pushed = true) {
    if (to !== at) void navigate('.', { replace: !pushed, state: { at: to, pushed } satisfies Step });
  }
  function goBack() {
    if (step?.pushed) {
      void navigate(-1);
      return;
    }
    const before = previousScreen(at, draft.answers, draft.context, draft.mode);
    if (before) goTo(before.id, false);
    else void navigate('/today');
  }

  function answer(answers: Answers, advance: boolean) {
    const taken = takeAnswers(draft, answers, at, newId);
    const next = advance ? stepAfter(taken.draft, at, draft.changing) : at;
    // What was wrong with the earlier answers need not be wrong with these.
    if (post.isError) post.reset();
    if (taken.alert) {
      outbox.add(
        {
          id: taken.alert.id,
          checkInId: taken.draft.id,
          answers: taken.alert.answers,
          answeredAt: new Date().toISOString(),
          rulesVersion,
        },
        serverNow(),
      );
    }
    save({ ...taken.draft, at: next, lastAt: advance ? at : null });
    if (advance) goTo(next);
  }

  function goOn() {
    const next = stepAfter(draft, at, draft.changing);
    save({ ...draft, at: next, lastAt: null });
    goTo(next);
  }
  function undo(last: Screen) {
    save({ ...draft, answers: withoutAnswer(draft.answers, last), at: last.id, lastAt: null });
    if (step?.pushed) void navigate(-1);
    else goTo(last.id, false);
  }
  function change(target: Screen) {
    save({ ...draft, changing: true, at: target.id, lastAt: null });
    goTo(target.id);
  }
  function mistaken() {
    const { caution } = draft;
    if (!caution) return;
    const mistake = { id: newId(), answeredAt: new Date().toISOString() };
    outbox.reportMistake(caution.alertId, mistake, serverNow());
    save({ ...takeBack(draft), lastAt: null });
    setTakenBack(true);
    goTo(caution.atBefore);
  }
  function send() {
    const sentAt = new Date().toISOString();
    const { id, mode, answers } = draft;
    const note = answers.note?.trim();
    save({ ...draft, tried: true });
    post.mutate(
      {
        id,
        kind: mode === 'full' ? 'daily' : 'something-new',
        answers: note ? { ...answers, note } : withoutNote(answers),
        answeredAt: sentAt,
        sentAt,
        rulesVersion,
      },
      {
        onSuccess: (accepted) => {
          dropFromDevice(storeOf(me, recordId), keptNames.draft[mode]);
          setReceipt(accepted);
        },
      },
    );
  }
  /** After a conflict: the changed answers go out as a check-in of their own. */
  function sendAsNew() {
    post.reset();
    save({ ...draft, id: newId(), tried: false });
  }

  return {
    me,
    draft,
    screen,
    receipt,
    alerts,
    takenBack,
    post,
    isFirst: !step?.pushed && previousScreen(at, draft.answers, draft.context, draft.mode) === null,
    answer,
    goBack,
    goOn,
    undo,
    change,
    closeCaution: () => save({ ...draft, caution: null }),
    mistaken,
    send,
    sendAsNew,
  };
}

function withoutNote(answers: Answers): Answers {
  const rest = { ...answers };
  delete rest.note;
  return rest;
}
