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

/** Several findings in the patient's words as one text: each thing is said once, the most urgent first. */
export function findingWords(
  t: TFunction<readonly ['check-in-screens', 'rules']>,
  findings: readonly Finding[],
  { emergencyNumber, crisisNumber, onCallNumber }: ClinicCard,
): FindingWords {
  const texts = findings.map((finding) => {
    const { values, ...keys } = patientTextOf(finding);
    const words = (key: string) => t(key, { emergencyNumber, crisisNumber, onCallNumber, ...values });
    return {
      title: words(keys.title),
      told: words(keys.told),
      why: words(keys.why),
      meanwhile: words(keys.meanwhile),
      next: words(keys.next),
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
