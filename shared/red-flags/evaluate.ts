import type { Answers } from '../check-ins/answers.ts';
import type { SymptomCode } from '../check-ins/symptoms.ts';
import { usualOf, type EarlierCheckIn } from '../check-ins/usual.ts';
import { inOrder, type Finding } from './findings.ts';
import type { Facts, OperationCard, Pause, Rule, SafetyFacts } from './rule.ts';
import { rules as shippedRules } from './rules/shipped.ts';

export type EvaluationInput = {
  answers: Answers;
  /** Earlier check-ins up to this one's time, in any order; later ones are the caller's to leave out. */
  history: readonly EarlierCheckIn[];
  day: number;
  operationCard: OperationCard;
  safetyFacts: SafetyFacts;
  precautionsInForce: readonly string[];
  rules: readonly Rule[];
};

const shown = (value: number | null): number | null =>
  value === null ? null : Math.round(value * 100) / 100;

/**
 * Runs the rules over one set of answers. The same call runs on the phone and on the server: pure, and the same
 * input gives the same findings, the most urgent first. All findings are kept.
 */
export const evaluate = (input: EvaluationInput): Finding[] => {
  const { answers, day, operationCard, safetyFacts, precautionsInForce } = input;
  const usual = usualOf(input.history);
  const painNow = answers.painNow ?? null;
  const facts: Facts = {
    answers,
    day,
    usual,
    painRise: painNow === null || usual.painNow === null ? null : painNow - usual.painNow,
    operationCard,
    safetyFacts,
    precautionsInForce,
  };
  const graded = new Set<SymptomCode>();
  const findings: Finding[] = [];
  for (const rule of input.rules) {
    if (!rule.on && rule.urgency !== 'emergency') continue;
    const hit = rule.detect(facts, rule.parameters, graded);
    if (!hit) continue;
    for (const symptom of rule.grades) graded.add(symptom);
    findings.push({
      code: rule.code,
      ruleVersion: rule.version,
      urgency: hit.urgency ?? rule.urgency,
      values: { day, painNow, usual: shown(usual.painNow), ...hit.values },
    });
  }
  return inOrder(findings);
};

/** What the findings stop: all exercises before the loading ones before none. */
export const pausesExercises = (
  findings: readonly Pick<Finding, 'code'>[],
  rules: readonly Rule[] = shippedRules,
): Pause => {
  const pauses = findings.map(({ code }) => rules.find((rule) => rule.code === code)?.pause ?? null);
  return pauses.includes('all') ? 'all' : pauses.includes('loading') ? 'loading' : null;
};
