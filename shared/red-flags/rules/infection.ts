import {
  aNumber,
  aTime,
  defineRule,
  hasSymptom,
  inWords,
  signsThatHold,
  yesNo,
  type Facts,
} from '../rule.ts';

type Thresholds = { readonly celsiusTenths: number; readonly fahrenheitTenths: number };

/** Null where no fever is felt; otherwise the number, or that there is none. */
const feltTemperature = (facts: Facts): NonNullable<Facts['answers']['temperature']> | null =>
  hasSymptom(facts, 'hot', 'chills') ? (facts.answers.temperature ?? 'not-measured') : null;

const reaches = (
  temperature: { unit: 'C' | 'F'; tenths: number },
  { celsiusTenths, fahrenheitTenths }: Thresholds,
): boolean => temperature.tenths >= (temperature.unit === 'C' ? celsiusTenths : fahrenheitTenths);

const asValues = (temperature: { unit: 'C' | 'F'; tenths: number } | 'not-measured') =>
  temperature === 'not-measured'
    ? { temperatureTenths: null, temperatureUnit: null }
    : { temperatureTenths: temperature.tenths, temperatureUnit: temperature.unit };

const feverQuestions = [
  aNumber('Temperature now?'),
  yesNo('Shaking chills?'),
  inWords('How does the wound look?'),
  yesNo('Cough, or burning when passing water?'),
  yesNo('Faint, confused or short of breath?'),
  inWords('Which fever or pain medicine, and when last?'),
];

const possibleSepsis = defineRule({
  code: 'possible-sepsis',
  version: 1,
  on: true,
  parameters: { celsiusTenths: 380, fahrenheitTenths: 1004 },
  urgency: 'emergency',
  pause: 'all',
  grades: ['hot', 'chills'],
  source: 'Signs of sepsis, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText:
    '38.0 °C (100.4 °F) or more with shaking chills and faintness; a fever felt and not measured counts.',
  callSheet: [yesNo('Has the ambulance been called?'), ...feverQuestions],
  detect: (facts, parameters) => {
    const temperature = feltTemperature(facts);
    const { shaking, danger } = facts.answers;
    if (temperature === null || !(temperature === 'not-measured' || reaches(temperature, parameters)))
      return null;
    return (shaking === 'yes' || shaking === 'not-sure') && danger?.includes('fainted-or-coughed-blood')
      ? { values: { ...asValues(temperature), shaking, faint: true } }
      : null;
  },
});

const feverHigh = defineRule({
  code: 'fever-high',
  version: 1,
  on: true,
  parameters: { celsiusTenths: 383, fahrenheitTenths: 1010 },
  urgency: 'urgent',
  pause: null,
  grades: ['hot', 'chills'],
  source: 'Hospital discharge instructions after shoulder surgery (38.0 and 38.3 °C are both published).',
  mark: 'published',
  clinicianText: '38.3 °C or 101.0 °F or more, compared in the unit entered.',
  callSheet: feverQuestions,
  detect: (facts, parameters) => {
    const temperature = feltTemperature(facts);
    return temperature !== null && temperature !== 'not-measured' && reaches(temperature, parameters)
      ? { values: asValues(temperature) }
      : null;
  },
});

const fever = defineRule({
  code: 'fever',
  version: 1,
  on: true,
  parameters: {
    celsiusTenths: 380,
    fahrenheitTenths: 1004,
    belowCelsiusTenths: 383,
    belowFahrenheitTenths: 1010,
  },
  urgency: 'same-day',
  pause: null,
  grades: ['hot', 'chills'],
  source: 'Hospital discharge instructions after shoulder surgery (38.0 and 38.3 °C are both published).',
  mark: 'published',
  clinicianText:
    'From 38.0 to below 38.3 °C, from 100.4 to below 101.0 °F, compared in the unit entered; or felt and not measured.',
  callSheet: feverQuestions,
  detect: (facts, parameters) => {
    const temperature = feltTemperature(facts);
    if (temperature === null) return null;
    const high = {
      celsiusTenths: parameters.belowCelsiusTenths,
      fahrenheitTenths: parameters.belowFahrenheitTenths,
    };
    const fires =
      temperature === 'not-measured' || (reaches(temperature, parameters) && !reaches(temperature, high));
    return fires ? { values: asValues(temperature) } : null;
  },
});

const woundPus = defineRule({
  code: 'wound-pus',
  version: 1,
  on: true,
  parameters: { colours: ['yellow', 'green', 'cloudy', 'not-sure'], thicknesses: ['thick', 'not-sure'] },
  urgency: 'urgent',
  pause: null,
  grades: ['wound-fluid', 'wet-dressing', 'wound-opened'],
  source:
    'CDC NHSN, surgical site infection criteria: colored and thick (milky, creamy, opaque, viscous). They count cases; here they prompt a call. Cloudy as a color is a default of ours.',
  mark: 'published',
  clinicianText: 'Fluid that is colored and thick, the published sign of pus, or the wound has opened.',
  callSheet: [
    inWords('Where on the wound, and how much?'),
    yesNo('Has the wound opened?'),
    yesNo('Redness spreading?'),
    aNumber('Temperature now?'),
    yesNo('Smell?'),
    aTime('When was the dressing last changed?'),
    yesNo('Can a photo be sent?'),
  ],
  detect: (facts, { colours, thicknesses }) => {
    const fluid = hasSymptom(facts, 'wound-fluid', 'wet-dressing');
    const { woundColour, woundThickness, woundSigns } = facts.answers;
    const signs = signsThatHold({
      pus:
        fluid &&
        colours.some((colour) => colour === woundColour) &&
        thicknesses.some((thickness) => thickness === woundThickness),
      'wound-opened': hasSymptom(facts, 'wound-opened') || (fluid && woundSigns?.includes('opened')),
      smell: fluid && woundSigns?.includes('smell'),
      'soaked-through': fluid && woundSigns?.includes('soaked-through'),
    });
    return signs.includes('pus') || signs.includes('wound-opened')
      ? {
          values: {
            colour: fluid ? (woundColour ?? null) : null,
            thickness: fluid ? (woundThickness ?? null) : null,
            signs: signs.join(', '),
          },
        }
      : null;
  },
});

export const infectionRules = { possibleSepsis, feverHigh, fever, woundPus };
