import type { DangerCode } from '../../check-ins/symptoms.ts';
import { compareUrgency, type Urgency } from '../findings.ts';
import { aTime, defineRule, inWords, yesNo, type Facts, type Hit } from '../rule.ts';

const isTicked = ({ answers }: Facts, code: DangerCode): boolean => answers.danger?.includes(code) ?? false;

const tickedAlone =
  (code: DangerCode) =>
  (facts: Facts): Hit | null =>
    isTicked(facts, code) ? { values: { sign: code } } : null;

/** A missing answer about the time counts as now. */
const urgencyOfTime = (when: string): Urgency => (when === 'earlier' ? 'urgent' : 'emergency');

const chestOrBreathing = defineRule({
  code: 'chest-or-breathing',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source:
    'Hospital discharge instructions after shoulder surgery; CDC, signs of venous thromboembolism. The 48 hours are a default of ours.',
  mark: 'published',
  clinicianText:
    'Chest pain, trouble breathing, fainting or coughing blood, now or within 48 hours, is an emergency even when it has passed; longer ago it is urgent.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    yesNo('Is it there now?'),
    aTime('When did it start?'),
    yesNo('Short of breath at rest or when speaking?'),
    yesNo('Any blood coughed up, or a faint?'),
    yesNo('One leg or the arm swollen or sore?'),
    yesNo('Taking the blood thinner as prescribed?'),
  ],
  detect: (facts) => {
    const chest = isTicked(facts, 'chest-or-breathing') ? (facts.answers.chestWhen ?? 'not-answered') : null;
    const fainted = isTicked(facts, 'fainted-or-coughed-blood')
      ? (facts.answers.faintedWhen ?? 'not-answered')
      : null;
    const urgency = [chest, fainted]
      .flatMap((when) => (when === null ? [] : urgencyOfTime(when)))
      .sort(compareUrgency)[0];
    return urgency ? { urgency, values: { chest, fainted } } : null;
  },
});

const strokeOrConfusion = defineRule({
  code: 'stroke-or-confusion',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source: 'Signs of stroke and of delirium, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'New confusion, drooping face, weak side or slurred speech, with or without fever.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    aTime('When was the person last well?'),
    yesNo('Does the face droop, or one side feel weak?'),
    yesNo('Is the speech slurred or muddled?'),
    yesNo('Any fever?'),
    inWords('Which medicines today, and how much?'),
  ],
  detect: tickedAlone('confusion-or-stroke'),
});

const circulation = defineRule({
  code: 'circulation',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source: 'Hospital discharge instructions after shoulder surgery.',
  mark: 'published',
  clinicianText: 'The hand of the operated arm is cold, pale or blue.',
  callSheet: [
    yesNo('Is the hand cold beside the other one?'),
    yesNo('Pale or blue?'),
    yesNo('Do the fingers move?'),
    yesNo('Is it numb?'),
    yesNo('Better after loosening sling, rings and dressing?'),
    aTime('When did it start?'),
  ],
  detect: tickedAlone('cold-hand'),
});

const sedation = defineRule({
  code: 'sedation',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source: 'Signs of opioid toxicity, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'Hard to wake or slow breathing: possible opioid toxicity.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    yesNo('Is someone with them?'),
    yesNo('Do they wake when spoken to?'),
    inWords('How many breaths in a minute?'),
    inWords('Which pain or sleep medicines, how much, when last?'),
    yesNo('Alcohol, or a sleeping tablet?'),
  ],
  detect: tickedAlone('hard-to-wake'),
});

const allergy = defineRule({
  code: 'allergy',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source: 'Signs of anaphylaxis, from memory, to be verified.',
  mark: 'from-memory',
  clinicianText: 'Swelling of the face or throat: possible anaphylaxis.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    yesNo('Trouble breathing or swallowing?'),
    yesNo('Rash or hives?'),
    inWords('Which new medicine or food, and when?'),
    yesNo('Is an adrenaline pen at hand, or used?'),
  ],
  detect: tickedAlone('face-or-throat'),
});

const bleeding = defineRule({
  code: 'bleeding',
  version: 1,
  on: true,
  parameters: {},
  urgency: 'emergency',
  pause: 'all',
  grades: [],
  source:
    'Bleeding not stopped by pressing: hospital discharge instructions. Blood vomited, black stool: from memory, to be verified.',
  mark: 'published',
  clinicianText: 'Bleeding that pressing does not stop, vomiting blood or black stool.',
  callSheet: [
    yesNo('Has the ambulance been called?'),
    inWords('Where from, and how much?'),
    yesNo('Does it slow when pressed for ten minutes?'),
    yesNo('Blood vomited, or black stool?'),
    yesNo('Dizzy, pale or faint?'),
    yesNo('Blood thinner, aspirin or anti-inflammatory taken?'),
  ],
  detect: tickedAlone('bleeding'),
});

export const bodyEmergencies = [
  chestOrBreathing,
  strokeOrConfusion,
  circulation,
  sedation,
  allergy,
  bleeding,
];
