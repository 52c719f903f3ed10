import {
  aTime,
  defineRule,
  hasSymptom,
  inWords,
  signsThatHold,
  yesNo,
  type Facts,
  type Hit,
} from '../rule.ts';

/** Tingling counts as numbness: it is the same nerve, and the higher reading is the safer one. */
const numbSigns = (facts: Facts): Record<string, boolean> => ({
  'hand-numb': hasSymptom(facts, 'hand-numb'),
  'hand-tingling': hasSymptom(facts, 'hand-tingling'),
});

const popSigns = (facts: Facts): readonly string[] =>
  hasSymptom(facts, 'pop-or-slip') ? (facts.answers.popSigns ?? []) : [];

const nerveSigns = (facts: Facts): string[] =>
  signsThatHold({
    ...numbSigns(facts),
    'cold-hand': facts.answers.danger?.includes('cold-hand'),
    'hand-numb-or-cold': popSigns(facts).includes('hand-numb-or-cold'),
  });

const outOfPlaceSigns = (facts: Facts): string[] =>
  signsThatHold({
    'changed-shape': hasSymptom(facts, 'changed-shape'),
    'looks-different': popSigns(facts).includes('looks-different'),
    'hurts-much-more': popSigns(facts).includes('hurts-much-more'),
    'cannot-use-hand': popSigns(facts).includes('cannot-use-hand'),
  });

const popOrShape = (facts: Facts): Hit['values'] => ({
  pop: hasSymptom(facts, 'pop-or-slip'),
  changedShape: hasSymptom(facts, 'changed-shape'),
});

const shoulderQuestions = [
  yesNo('Does the shoulder look different from the other one?'),
  yesNo('Is the hand warm, do the fingers move?'),
  yesNo('Any numbness?'),
  yesNo('Can the hand be used at the waist?'),
  inWords('What was being done when it happened?'),
  aTime('When was the last food or drink?'),
];

const compartment = defineRule({
  code: 'compartment',
  version: 1,
  on: true,
  parameters: { medicineThatFails: ['no', 'not-sure'] },
  urgency: 'emergency',
  pause: 'all',
  grades: ['tight-forearm', 'hand-numb', 'hand-tingling', 'hand-weak'],
  source: 'Signs of compartment syndrome, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'Tight, hard forearm with numbness, weakness or pain that medicine does not touch.',
  callSheet: [
    yesNo('Is the forearm hard to the touch?'),
    yesNo('Does straightening the fingers hurt badly?'),
    yesNo('Numb or weak?'),
    yesNo('Is the hand warm and pink?'),
    yesNo('Better after loosening sling, rings and dressing?'),
    aTime('When did it start?'),
    aTime('When was the last food or drink?'),
  ],
  detect: (facts, { medicineThatFails }) => {
    if (!hasSymptom(facts, 'tight-forearm')) return null;
    const signs = signsThatHold({
      ...numbSigns(facts),
      'hand-weak': hasSymptom(facts, 'hand-weak'),
      'medicine-fails':
        facts.answers.painMedicine && medicineThatFails.some((code) => code === facts.answers.painMedicine),
    });
    return signs.length > 0 ? { values: { signs: signs.join(', ') } } : null;
  },
});

const dislocationWithNerve = defineRule({
  code: 'dislocation-with-nerve',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: ['pop-or-slip', 'changed-shape', 'hand-numb', 'hand-tingling'],
  source: 'Default of ours: a dislocation with a hand that is numb, cold or pale threatens nerve or vessel.',
  mark: 'default',
  clinicianText: 'Pop, slip or changed shape with a numb, cold or pale hand.',
  callSheet: shoulderQuestions,
  detect: (facts) => {
    const signs = nerveSigns(facts);
    return hasSymptom(facts, 'pop-or-slip', 'changed-shape') && signs.length > 0
      ? { values: { ...popOrShape(facts), signs: signs.join(', ') } }
      : null;
  },
});

const dislocation = defineRule({
  code: 'dislocation',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'urgent',
  pause: 'all',
  grades: ['pop-or-slip', 'changed-shape'],
  source:
    'Early dislocation after reverse arthroplasty, J Shoulder Elbow Surg 2014;23:737-744: 2.9 %, on average at 3.4 weeks.',
  mark: 'published',
  clinicianText:
    'Changed shape, or a pop or slip with much more pain or the hand no longer usable at the waist: dislocated until shown otherwise. Told to keep the sling on and to have nothing to eat or drink.',
  callSheet: shoulderQuestions,
  detect: (facts) => {
    const signs = outOfPlaceSigns(facts);
    return signs.length > 0 ? { values: { ...popOrShape(facts), signs: signs.join(', ') } } : null;
  },
});

const popAlone = defineRule({
  code: 'pop-alone',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'same-day',
  pause: 'loading',
  grades: ['pop-or-slip'],
  source: 'Default of ours.',
  mark: 'default',
  clinicianText: 'Pop or slip with nothing else.',
  callSheet: shoulderQuestions,
  detect: (facts) =>
    hasSymptom(facts, 'pop-or-slip') && outOfPlaceSigns(facts).length === 0 && nerveSigns(facts).length === 0
      ? { values: { pop: true } }
      : null,
});

const handWeakness = defineRule({
  code: 'hand-weakness',
  version: 1,
  on: true,
  parameters: { urgentFromDay: 3 },
  urgency: 'urgent',
  pause: null,
  grades: ['hand-weak'],
  source: 'Default of ours.',
  mark: 'default',
  clinicianText: 'New weakness of the hand; on days 0 to 2 a block may explain it, so it is same day.',
  callSheet: [
    yesNo('Can the wrist be cocked up?'),
    yesNo('Can the fingers be spread and closed?'),
    yesNo('Numb as well, and where?'),
    yesNo('Is the hand warm and pink?'),
    aTime('When did it start?'),
    yesNo('Was it ever back to normal after the block?'),
  ],
  detect: (facts, { urgentFromDay }) =>
    hasSymptom(facts, 'hand-weak')
      ? { urgency: facts.day >= urgentFromDay ? 'urgent' : 'same-day', values: { handWeak: true } }
      : null,
});

const clotArm = defineRule({
  code: 'clot-arm',
  version: 1,
  on: true,
  parameters: { painRise: 2, painRiseAfterDay: 3, muchMoreFromDay: 7 },
  urgency: 'urgent',
  pause: null,
  grades: [],
  source:
    'Clots after shoulder arthroplasty, Diagnostics 2023;13:636: 0.8 %. CDC, signs of venous thromboembolism. What counts as a rise is a default of ours.',
  mark: 'published',
  clinicianText:
    'Whole arm and hand swollen with tightness, color change or a rise: pain up 2 or more on the usual after day 3, or swelling much more after the first week.',
  callSheet: [
    yesNo('Swollen from shoulder to hand?'),
    yesNo('Tight, blue, red or purple?'),
    yesNo('Veins standing out on chest or arm?'),
    yesNo('Chest pain or short of breath?'),
    yesNo('Better after raising the hand overnight?'),
    yesNo('Earlier clot, or cancer treatment?'),
    yesNo('Taking the blood thinner as prescribed?'),
  ],
  detect: ({ answers, day, painRise }, parameters) => {
    const { swelling, swellingWhere, swellingColour } = answers;
    if ((swelling !== 'more' && swelling !== 'much-more') || swellingWhere !== 'whole-arm') return null;
    const signs = signsThatHold({
      'tight-or-coloured': swellingColour === 'yes',
      'maybe-tight-or-coloured': swellingColour === 'not-sure',
      'much-more-swollen': swelling === 'much-more' && day >= parameters.muchMoreFromDay,
      'pain-up': painRise !== null && painRise >= parameters.painRise && day > parameters.painRiseAfterDay,
    });
    return signs.length > 0 ? { values: { swelling, signs: signs.join(', ') } } : null;
  },
});

export const armRules = { compartment, dislocationWithNerve, dislocation, popAlone, handWeakness, clotArm };
