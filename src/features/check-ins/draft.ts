import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInContext } from '#shared/check-ins/contract.ts';
import type { CheckInMode } from '#shared/check-ins/screens.ts';
import type { RuleCode, Urgency } from '#shared/red-flags/findings.ts';

/** A finding as far as two of them are compared: `told` names the patient's words for it. */
export type Told = { code: RuleCode; urgency: Urgency; told: string };

/** An alert that went out from this check-in, and what it told. */
type SentAlert = { id: string; findings: Told[] };

/** The caution that stands over the questions, and what takes it back when the tick was a mistake. */
type ShownCaution = { alertId: string; answersBefore: Answers; atBefore: string };

/** A check-in under way, as it is kept on the device. */
export type CheckInDraft = {
  version: 1;
  /** The check-in's own id, made here, so that sending it twice is sending it once. */
  id: string;
  mode: CheckInMode;
  /** The patient's date when it was begun; a draft of another day is not gone on with. */
  date: string;
  /**
   * What the rules read besides the answers, as it was when the check-in was begun. It stays with the draft, so
   * that the advice on the spot needs no network.
   */
  context: CheckInContext;
  answers: Answers;
  /** The question on the screen. */
  at: string;
  /** The question answered last, for undo and for the line that shows the answer back. */
  lastAt: string | null;
  /** The person came from the review to change one answer, and goes back there. */
  changing: boolean;
  alerts: SentAlert[];
  caution: ShownCaution | null;
  /** It was tried to send these answers, so the server may hold them under this id. */
  tried: boolean;
};

export function newDraft(
  mode: CheckInMode,
  context: CheckInContext,
  firstScreenId: string,
  id: string,
): CheckInDraft {
  return {
    version: 1,
    id,
    mode,
    date: context.date,
    context,
    answers: {},
    at: firstScreenId,
    lastAt: null,
    changing: false,
    alerts: [],
    caution: null,
    tried: false,
  };
}

/** What was kept on the device, where it is a draft of this kind and of this day; null otherwise. */
export function draftFrom(kept: unknown, mode: CheckInMode, date: string | null): CheckInDraft | null {
  if (typeof kept !== 'object' || kept === null) return null;
  const draft = kept as Partial<CheckInDraft>;
  const whole =
    draft.version === 1 &&
    draft.mode === mode &&
    typeof draft.id === 'string' &&
    typeof draft.context === 'object' &&
    typeof draft.answers === 'object' &&
    typeof draft.at === 'string' &&
    Array.isArray(draft.alerts);
  if (!whole) return null;
  // Off line the date is not known from the server; then the draft is what there is.
  return date === null || draft.date === date ? (draft as CheckInDraft) : null;
}
