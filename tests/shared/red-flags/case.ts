import type { Answers } from '#shared/check-ins/answers.ts';
import { evaluate, type EvaluationInput } from '#shared/red-flags/evaluate.ts';
import { highestUrgency, type Finding, type Urgency } from '#shared/red-flags/findings.ts';
import { rules } from '#shared/red-flags/rules/shipped.ts';

type Circumstances = Partial<Omit<EvaluationInput, 'answers' | 'history'>> & {
  /** Pain now of earlier check-ins, oldest first. */
  usually?: readonly number[];
};

/** Day 24 after an operation without a block, no blood thinner, nothing before, unless a test says otherwise. */
export const findingsOf = (answers: Answers, { usually = [], ...rest }: Circumstances = {}): Finding[] =>
  evaluate({
    answers,
    history: usually.map((painNow, index) => ({
      answeredAt: new Date(Date.UTC(2025, 10, 1 + index, 8)).toISOString(),
      painNow,
      painWorst: null,
      byProxy: false,
    })),
    day: 24,
    operationCard: { block: 'none' },
    safetyFacts: { bloodThinner: false },
    precautionsInForce: ['sling', 'reaching', 'lifting'],
    rules,
    ...rest,
  });

export const urgencyOf = (answers: Answers, circumstances?: Circumstances): Urgency | null =>
  highestUrgency(findingsOf(answers, circumstances));

/** "code urgency" of every finding, in order. */
export const firedBy = (answers: Answers, circumstances?: Circumstances): string[] =>
  findingsOf(answers, circumstances).map(({ code, urgency }) => `${code} ${urgency}`);
