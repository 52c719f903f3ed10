import type { TFunction } from 'i18next';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { patientTextOf } from '#shared/red-flags/patient-text.ts';

const unique = (texts: string[]): string[] => [...new Set(texts)];

export type FindingWords = {
  /** Of the most urgent. */
  title: string;
  /** All that was told, in one line. */
  told: string;
  why: string[];
  meanwhile: string[];
  next: string[];
};

type T = TFunction<readonly ['check-in-screens', 'rules']>;

/** What no other rule grades is told back by the words that were ticked. */
function signWords(t: T, { values }: Finding, otherwise: string): string {
  const signs = typeof values.signs === 'string' ? values.signs.split(', ').filter(Boolean) : [];
  const words = signs.map((sign) => t([`check-in:symptoms.${sign}`, `signs.${sign}`, otherwise]));
  return words.length > 0 ? unique(words).join('; ') : t(otherwise);
}

/** While nobody is there to call, "we will call you" would be untrue: the person calls. */
const isToCall = ({ code, urgency }: Finding, closed: boolean): boolean =>
  closed && urgency === 'urgent' && code !== 'self-harm';

/** Several findings in the patient's words as one text: each thing is said once, the most urgent first. */
export function findingWords(
  t: T,
  findings: readonly Finding[],
  { emergencyNumber, crisisNumber, onCallNumber }: ClinicCard,
  closed: boolean,
): FindingWords {
  const texts = findings.map((finding) => {
    const { values, ...keys } = patientTextOf(finding);
    const words = (key: string) => t(key, { emergencyNumber, crisisNumber, onCallNumber, ...values });
    return {
      title: isToCall(finding, closed) ? t('caution.closed.title') : words(keys.title),
      told: finding.code === 'unclassified' ? signWords(t, finding, keys.told) : words(keys.told),
      why: words(keys.why),
      meanwhile: words(keys.meanwhile),
      next: isToCall(finding, closed) ? t('caution.closed.next') : words(keys.next),
    };
  });
  return {
    title: texts[0]?.title ?? '',
    told: unique(texts.map(({ told }) => told)).join('; '),
    why: unique(texts.map(({ why }) => why)),
    meanwhile: unique(texts.map(({ meanwhile }) => meanwhile)),
    next: unique(texts.map(({ next }) => next)),
  };
}
