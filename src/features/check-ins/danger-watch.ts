import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInContext } from '#shared/check-ins/contract.ts';
import { evaluate } from '#shared/red-flags/evaluate.ts';
import { compareUrgency } from '#shared/red-flags/findings.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { patientTextOf } from '#shared/red-flags/patient-text.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';
import type { CheckInDraft, Told } from './draft.ts';

/** What the phone's rules find in the answers, as the server's will. */
export function findingsOf(answers: Answers, context: CheckInContext): Finding[] {
  const { history, day, operationCard, safetyFacts, precautionsInForce } = context;
  return evaluate({ answers, history, day, operationCard, safetyFacts, precautionsInForce, rules });
}

/** The findings that do not wait for the end of the form. */
export const seriousOf = (findings: readonly Finding[]): Finding[] =>
  findings.filter(({ urgency }) => urgency === 'emergency' || urgency === 'urgent');

const toldOf = (finding: Finding): Told => ({
  code: finding.code,
  urgency: finding.urgency,
  told: patientTextOf(finding).told,
});

/** Whether the first already says what the second says: the same words, or the same rule more urgently. */
const covers = (first: Told, second: Told): boolean =>
  first.code === second.code &&
  (compareUrgency(first.urgency, second.urgency) < 0 ||
    (first.urgency === second.urgency && first.told === second.told));

/** What has to go to the clinic now. */
export type NewAlert = { id: string; answers: Answers };

/**
 * Takes new answers into the draft. A danger that was not there before puts the caution over the questions at
 * once; unless an alert of this check-in has told of it already, a further alert has to go out.
 */
export function takeAnswers(
  draft: CheckInDraft,
  answers: Answers,
  at: string,
  newId: () => string,
): { draft: CheckInDraft; alert: NewAlert | null } {
  const taken: CheckInDraft = {
    ...draft,
    answers,
    // The server may hold the earlier answers under the old id: changed ones are a check-in of their own.
    ...(draft.tried ? { id: newId(), tried: false } : {}),
  };
  const before = seriousOf(findingsOf(draft.answers, draft.context)).map(toldOf);
  const now = seriousOf(findingsOf(answers, draft.context)).map(toldOf);
  const fresh = now.filter((told) => !before.some((earlier) => covers(earlier, told)));
  if (fresh.length === 0) return { draft: taken, alert: null };

  const sentFor = (told: Told) =>
    draft.alerts.findLast(({ findings }) => findings.some((sent) => covers(sent, told)));
  const unsent = fresh.filter((told) => !sentFor(told));
  const known = fresh.map(sentFor).find((alert) => alert !== undefined);
  const caution = { answersBefore: draft.answers, atBefore: at };
  if (unsent.length === 0 && known) {
    return { draft: { ...taken, caution: { ...caution, alertId: known.id } }, alert: null };
  }
  const id = newId();
  return {
    draft: {
      ...taken,
      alerts: [...draft.alerts, { id, findings: now }],
      caution: { ...caution, alertId: id },
    },
    alert: { id, answers },
  };
}

/**
 * The tick that brought the caution up was a mistake: the answers are as they were before it. The alert is no
 * longer counted as having told of anything, so that ticking the same again sends again.
 */
export function takeBack(draft: CheckInDraft): CheckInDraft {
  const { caution } = draft;
  if (!caution) return draft;
  return {
    ...draft,
    answers: caution.answersBefore,
    at: caution.atBefore,
    alerts: draft.alerts.filter(({ id }) => id !== caution.alertId),
    caution: null,
  };
}
