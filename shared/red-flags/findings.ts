/** From the highest to the lowest. */
export const urgencies = ['emergency', 'urgent', 'same-day', 'routine'] as const;
export type Urgency = (typeof urgencies)[number];

export const ruleCodes = [
  'chest-or-breathing',
  'stroke-or-confusion',
  'circulation',
  'sedation',
  'allergy',
  'bleeding',
  'compartment',
  'possible-sepsis',
  'head-injury',
  'dislocation-with-nerve',
  'self-harm',
  'dislocation',
  'fall-with-injury',
  'fever-high',
  'wound-pus',
  'hand-weakness',
  'clot-arm',
  'clot-leg',
  'pain-uncontrolled',
  'fluids',
  'water',
  'pop-alone',
  'fall',
  'fever',
  'pain-severe',
  'pain-rise',
  'unclassified',
] as const;
export type RuleCode = (typeof ruleCodes)[number];

/** One rule that fired, with the values that made it fire, among them the day and the person's own usual. */
export type Finding = {
  code: RuleCode;
  ruleVersion: number;
  /** It can be below the rule's own, as chest pain that is over for more than two days is urgent. */
  urgency: Urgency;
  values: Record<string, string | number | boolean | null>;
};

/** Negative when the first is the more urgent, so that sorting puts the most urgent first. */
export const compareUrgency = (a: Urgency, b: Urgency): number => urgencies.indexOf(a) - urgencies.indexOf(b);

export const highestUrgency = (findings: readonly Pick<Finding, 'urgency'>[]): Urgency | null =>
  findings.map((finding) => finding.urgency).sort(compareUrgency)[0] ?? null;

/** The most urgent first; among equals in the order of the rules, so that the same findings always read alike. */
export const inOrder = (findings: readonly Finding[]): Finding[] =>
  [...findings].sort(
    (a, b) => compareUrgency(a.urgency, b.urgency) || ruleCodes.indexOf(a.code) - ruleCodes.indexOf(b.code),
  );
