import type { Finding, RuleCode } from './findings.ts';

const chestVariant = ({ urgency, values }: Finding): string => {
  const told =
    values.fainted === null
      ? 'chest-or-breathing'
      : values.chest === null
        ? 'fainting'
        : 'chest-and-fainting';
  return urgency === 'emergency' ? told : `${told}-earlier`;
};

/** Where a rule has more than one block of words, what was told decides; elsewhere its code names the block. */
const variants: Partial<Record<RuleCode, (finding: Finding) => string>> = {
  'chest-or-breathing': chestVariant,
  'self-harm': ({ values }) => (values.selfHarm === 'yes' ? 'self-harm' : 'self-harm-unsure'),
  'hand-weakness': ({ urgency }) => (urgency === 'urgent' ? 'hand-weakness' : 'hand-weakness-early'),
  'wound-pus': ({ values }) =>
    typeof values.signs === 'string' && values.signs.split(', ').includes('pus')
      ? 'wound-pus'
      : 'wound-opened',
  fever: ({ values }) => (values.temperatureTenths === null ? 'fever-felt' : 'fever'),
};

type PatientText = {
  title: string;
  /** Completes "You told us: …". */
  told: string;
  why: string;
  meanwhile: string;
  next: string;
  /** For the words' gaps; the clinic's telephone numbers are added by the screen. */
  values: { painNow: string; painWorst: string; usual: string; temperature: string };
};

const shown = (value: Finding['values'][string] | undefined): string =>
  typeof value === 'number' ? String(Math.round(value)) : '';

/** Where a finding's words for the patient are, with what fills their gaps. */
export const patientTextOf = (finding: Finding): PatientText => {
  const block = `rules:${variants[finding.code]?.(finding) ?? finding.code}`;
  const { painNow, painWorst, usual, temperatureTenths, temperatureUnit } = finding.values;
  return {
    title: `${block}.title`,
    told: `${block}.told`,
    why: `${block}.why`,
    meanwhile: `${block}.meanwhile`,
    next: `${block}.next`,
    values: {
      painNow: shown(painNow),
      painWorst: shown(painWorst),
      usual: shown(usual),
      temperature:
        typeof temperatureTenths === 'number' && typeof temperatureUnit === 'string'
          ? `${(temperatureTenths / 10).toFixed(1)} °${temperatureUnit}`
          : '',
    },
  };
};
