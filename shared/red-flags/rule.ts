import type { Answers } from '../check-ins/answers.ts';
import type { SymptomCode } from '../check-ins/symptoms.ts';
import type { Usual } from '../check-ins/usual.ts';
import type { Finding, RuleCode, Urgency } from './findings.ts';

export type OperationCard = {
  /** The nerve block given at surgery; it explains numbness in the first days. */
  block: 'none' | 'single' | 'long-acting';
};

export type SafetyFacts = {
  /** Null where nobody has recorded it: unknown counts as taking one. */
  bloodThinner: boolean | null;
};

/** Everything a rule may look at. Nothing else: no clock, no chart. */
export type Facts = {
  answers: Answers;
  /** The day after surgery that the check-in is for; surgery is day 0. */
  day: number;
  usual: Usual;
  /** Pain now less the person's usual; null where one of the two is missing. */
  painRise: number | null;
  operationCard: OperationCard;
  safetyFacts: SafetyFacts;
  precautionsInForce: readonly string[];
};

export type Hit = {
  /** Where it is below the rule's own. */
  urgency?: Urgency;
  values: Finding['values'];
};

/** What exercises stop at once, on the device, until a clinician clears it. */
export type Pause = 'all' | 'loading' | null;

type CallSheetQuestion = { ask: string; answer: 'yes-no' | 'time' | 'number' | 'words' };

type RuleParameters = Readonly<Record<string, number | readonly string[]>>;

/**
 * A rule as a clinic reviews it: all but `detect` is plain data. Thresholds stand in the parameters and nowhere
 * else, so that a changed one can be tried on a copy of the rule.
 */
export type Rule<Parameters extends RuleParameters = RuleParameters> = {
  code: RuleCode;
  version: number;
  /** Emergency rules run whatever this says. */
  on: boolean;
  parameters: Parameters;
  /** The highest that it gives. */
  urgency: Urgency;
  pause: Pause;
  /** The symptoms it takes care of when it fires; what no rule that fired takes care of is unclassified. */
  grades: readonly SymptomCode[];
  source: string;
  /** Whether the source is published, common practice, from memory and to be verified, or a default of ours. */
  mark: 'published' | 'common-practice' | 'from-memory' | 'default';
  /** What the rule says, for clinicians. */
  clinicianText: string;
  callSheet: readonly CallSheetQuestion[];
  detect(facts: Facts, parameters: Parameters, graded: ReadonlySet<SymptomCode>): Hit | null;
};

/** Keeps the type of a rule's own parameters where the rule is written. */
export const defineRule = <const Parameters extends RuleParameters>(
  rule: Rule<Parameters>,
): Rule<Parameters> => rule;

export const yesNo = (ask: string): CallSheetQuestion => ({ ask, answer: 'yes-no' });
export const inWords = (ask: string): CallSheetQuestion => ({ ask, answer: 'words' });
export const aTime = (ask: string): CallSheetQuestion => ({ ask, answer: 'time' });
export const aNumber = (ask: string): CallSheetQuestion => ({ ask, answer: 'number' });

export const hasSymptom = ({ answers }: Facts, ...codes: SymptomCode[]): boolean =>
  codes.some((code) => answers.symptoms?.includes(code));

/** The codes of those conditions that hold, as one value of a finding. */
export const signsThatHold = (signs: Readonly<Record<string, boolean | undefined>>): string[] =>
  Object.entries(signs).flatMap(([code, present]) => (present ? [code] : []));
