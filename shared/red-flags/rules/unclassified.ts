import type { SymptomCode } from '../../check-ins/symptoms.ts';
import { defineRule, inWords, yesNo, type Facts } from '../rule.ts';

type Expected = {
  readonly blockUntilDay: number;
  readonly celsiusTenths: number;
  readonly fahrenheitTenths: number;
};

/** Numbness is the block's only as long as one can last, and only when it has been there since surgery. */
const isExplainedByBlock = ({ answers, day, operationCard }: Facts, { blockUntilDay }: Expected): boolean =>
  operationCard.block !== 'none' && day <= blockUntilDay && answers.numbSince === 'since-surgery';

/** Felt hot, measured, and no fever; unless there was shaking, which a thermometer does not take back. */
const isNoFever = ({ answers }: Facts, { celsiusTenths, fahrenheitTenths }: Expected): boolean => {
  const { temperature, shaking } = answers;
  return (
    temperature !== undefined &&
    temperature !== 'not-measured' &&
    temperature.tenths < (temperature.unit === 'C' ? celsiusTenths : fahrenheitTenths) &&
    shaking !== 'yes' &&
    shaking !== 'not-sure'
  );
};

const isExpected = (symptom: SymptomCode, facts: Facts, parameters: Expected): boolean =>
  symptom === 'hand-numb' || symptom === 'hand-tingling'
    ? isExplainedByBlock(facts, parameters)
    : (symptom === 'hot' || symptom === 'chills') && isNoFever(facts, parameters);

/**
 * The safety net: what a person ticked and no rule that fired takes care of goes to a human. It runs last. What
 * is expected is graded too, as none.
 */
export const unclassified = defineRule({
  code: 'unclassified',
  version: 1,
  on: true,
  parameters: { blockUntilDay: 3, celsiusTenths: 380, fahrenheitTenths: 1004, armSwellingFromDay: 7 },
  urgency: 'same-day',
  pause: null,
  grades: [],
  source: 'Default of ours. A block lasts 6 to 18 hours, a long-acting one up to 72.',
  mark: 'default',
  clinicianText:
    'Something was reported that no other rule grades; a whole arm swollen after the first week, or a precaution broken with more pain or a change since, counts.',
  callSheet: [
    inWords('What is it, in their own words?'),
    inWords('Since when, and is it getting worse?'),
    yesNo('Fever, or feeling unwell?'),
    yesNo('Numb, weak or cold hand?'),
    yesNo('Chest pain or short of breath?'),
    inWords('What would help most?'),
  ],
  detect: (facts, parameters, graded) => {
    const { symptoms = [], swelling, swellingWhere, sling, heldOffSince } = facts.answers;
    const left: string[] = symptoms.filter(
      (symptom) => !graded.has(symptom) && !isExpected(symptom, facts, parameters),
    );
    if (
      (swelling === 'more' || swelling === 'much-more') &&
      swellingWhere === 'whole-arm' &&
      facts.day >= parameters.armSwellingFromDay
    ) {
      left.push('arm-swelling');
    }
    if (sling?.includes('held-off') && (heldOffSince === 'hurts-more' || heldOffSince === 'other')) {
      left.push('held-off-with-symptom');
    }
    return left.length > 0 ? { values: { signs: left.join(', ') } } : null;
  },
});
