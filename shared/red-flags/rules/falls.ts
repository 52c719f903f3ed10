import { defineRule, hasSymptom, inWords, aTime, signsThatHold, yesNo, type Facts } from '../rule.ts';

const fallSigns = (facts: Facts): readonly string[] =>
  hasSymptom(facts, 'fall') ? (facts.answers.fallSigns ?? []) : [];

const headInjury = defineRule({
  code: 'head-injury',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: ['fall'],
  source: 'Head injury under a blood thinner or with loss of consciousness, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText:
    'Fall with a blow to the head and either knocked out or a blood thinner on record; a blood thinner that nobody has recorded counts as one.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    yesNo('Knocked out, or no memory of the fall?'),
    yesNo('Headache, vomiting or drowsy?'),
    inWords('Which blood thinner, and when was the last dose?'),
    yesNo('Is someone with them?'),
    yesNo('Neck pain?'),
    yesNo('Shoulder or hand changed since?'),
  ],
  detect: (facts) => {
    const signs = fallSigns(facts);
    const hitHead = signs.includes('hit-head');
    const knockedOut = signs.includes('knocked-out');
    const { bloodThinner } = facts.safetyFacts;
    // Whoever was knocked out by a fall has had a blow to the head, ticked or not.
    return knockedOut || (hitHead && bloodThinner !== false)
      ? { values: { hitHead, knockedOut, bloodThinner } }
      : null;
  },
});

const fallWithInjury = defineRule({
  code: 'fall-with-injury',
  version: 1,
  on: true,
  parameters: { painRise: 2 },
  urgency: 'urgent',
  pause: 'all',
  grades: ['fall'],
  source: 'Default of ours. The change of 2 points: Farrar et al., Pain 2001;94:149-158, from memory.',
  mark: 'default',
  clinicianText:
    'Fall with pain up 2 or more or said to hurt more since, lost use, changed shape, or legs that do not bear.',
  callSheet: [
    yesNo('Hit the head, or blacked out?'),
    yesNo('Does the shoulder look different?'),
    yesNo('Is the hand warm, do the fingers move?'),
    yesNo('Any numbness?'),
    yesNo('Can they stand and walk?'),
    inWords('How did the fall come about?'),
    aTime('When was the last food or drink?'),
  ],
  detect: (facts, parameters) => {
    if (!hasSymptom(facts, 'fall')) return null;
    const pop = hasSymptom(facts, 'pop-or-slip') ? (facts.answers.popSigns ?? []) : [];
    const signs = signsThatHold({
      'pain-up': facts.painRise !== null && facts.painRise >= parameters.painRise,
      'hurts-more': fallSigns(facts).includes('hurts-more'),
      'cannot-stand': fallSigns(facts).includes('cannot-stand'),
      'cannot-use-hand': pop.includes('cannot-use-hand'),
      'hand-weak': hasSymptom(facts, 'hand-weak'),
      'changed-shape': hasSymptom(facts, 'changed-shape') || pop.includes('looks-different'),
    });
    return signs.length > 0
      ? { values: { onArm: fallSigns(facts).includes('on-arm'), signs: signs.join(', ') } }
      : null;
  },
});

const fall = defineRule({
  code: 'fall',
  version: 1,
  on: true,
  parameters: { untilDay: 90 },
  urgency: 'same-day',
  pause: null,
  grades: ['fall'],
  source: 'Falls after shoulder arthroplasty, 2020: 10.6 % fall.',
  mark: 'published',
  clinicianText: 'Any fall up to day 90.',
  callSheet: [
    yesNo('Hit the head, or blacked out?'),
    yesNo('Onto the operated arm?'),
    yesNo('Everything as before since?'),
    inWords('How did the fall come about?'),
    yesNo('Dizzy, or new medicine?'),
    yesNo('Someone at home?'),
  ],
  detect: (facts, { untilDay }) =>
    hasSymptom(facts, 'fall') && facts.day <= untilDay
      ? {
          values: {
            onArm: fallSigns(facts).includes('on-arm'),
            hitHead: fallSigns(facts).includes('hit-head'),
          },
        }
      : null,
});

export const fallRules = { headInjury, fallWithInjury, fall };
