import { aNumber, aTime, defineRule, hasSymptom, inWords, yesNo } from '../rule.ts';

const selfHarm = defineRule({
  code: 'self-harm',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: null,
  grades: ['low-mood'],
  source: 'Default of ours, in words of our own; no licensed item.',
  mark: 'default',
  clinicianText: 'Thoughts of self-harm answered yes or not sure, after feeling low.',
  callSheet: [
    yesNo('Safe at this moment?'),
    yesNo('Is someone with them?'),
    yesNo('Thinking of a way to do it?'),
    yesNo('Medicines or other means at hand?'),
    yesNo('Crisis line given, and called?'),
    inWords('Who can be with them today?'),
  ],
  detect: (facts) =>
    hasSymptom(facts, 'low-mood') &&
    (facts.answers.selfHarm === 'yes' || facts.answers.selfHarm === 'not-sure')
      ? { values: { selfHarm: facts.answers.selfHarm } }
      : null,
});

const clotLeg = defineRule({
  code: 'clot-leg',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'urgent',
  pause: null,
  grades: ['calf'],
  source:
    'CDC, signs of venous thromboembolism; clots after shoulder arthroplasty, Diagnostics 2023;13:636: 0.8 %.',
  mark: 'published',
  clinicianText: 'One calf both sore and swollen.',
  callSheet: [
    yesNo('One leg only?'),
    yesNo('Warm or red?'),
    yesNo('Chest pain or short of breath?'),
    yesNo('Earlier clot, or cancer treatment?'),
    yesNo('Taking the blood thinner as prescribed?'),
    yesNo('Up and walking most days?'),
  ],
  detect: (facts) =>
    hasSymptom(facts, 'calf') && facts.answers.calfSigns === 'both' ? { values: { calf: 'both' } } : null,
});

const fluids = defineRule({
  code: 'fluids',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'urgent',
  pause: null,
  grades: ['no-fluids'],
  source: 'From memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'Cannot keep fluids down for a day.',
  callSheet: [
    aTime('When was the last drink kept down?'),
    aTime('When was water last passed?'),
    yesNo('Dizzy on standing?'),
    yesNo('Blood, or belly pain?'),
    inWords('Which medicines cannot be kept down?'),
    aNumber('Temperature now?'),
  ],
  detect: (facts) => (hasSymptom(facts, 'no-fluids') ? { values: { noFluids: true } } : null),
});

const water = defineRule({
  code: 'water',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'urgent',
  pause: null,
  grades: ['no-water'],
  source: 'From memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'Cannot pass water.',
  callSheet: [
    aTime('When was water last passed?'),
    yesNo('Lower belly full or sore?'),
    inWords('How much has been drunk today?'),
    inWords('Which pain medicines?'),
    yesNo('Known prostate or bladder trouble?'),
    yesNo('Legs weak or numb?'),
  ],
  detect: (facts) => (hasSymptom(facts, 'no-water') ? { values: { noWater: true } } : null),
});

export const wellbeingRules = { selfHarm, clotLeg, fluids, water };
