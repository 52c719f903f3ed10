import { text } from './choices.ts';
import { followUps } from './follow-ups.ts';
import type { Choice, Screen, Tile } from './screens.ts';
import { symptomFollowUps } from './symptom-follow-ups.ts';
import {
  dangerCodes,
  lateHandSymptoms,
  lateHandSymptomsFromWeek,
  symptomsByTile,
  type SymptomCode,
  type TileCode,
} from './symptoms.ts';

const symptomChoice = (code: SymptomCode): Choice<SymptomCode> => ({
  code,
  textKey: text(`symptoms.${code}`),
  ...(lateHandSymptoms.includes(code) ? { fromWeek: lateHandSymptomsFromWeek } : {}),
});

const tile = (code: TileCode): Tile => ({
  code,
  textKey: text(`tiles.${code}.title`),
  examplesKey: text(`tiles.${code}.examples`),
  choices: symptomsByTile[code].map(symptomChoice),
});

/**
 * The questions of a check-in in the order they are asked; follow-ups stand right behind what they follow.
 * When all is well every screen takes one tap: seven here, and one to start (domain, section 3).
 */
export const tree: readonly Screen[] = [
  {
    id: 'pain-now',
    kind: 'scale',
    key: 'painNow',
    titleKey: text('pain-now.title'),
    hintKey: text('pain-now.hint'),
    when: [],
    fullOnly: true,
    seconds: 5,
    askedFor: null,
  },
  {
    id: 'pain-worst',
    kind: 'scale',
    key: 'painWorst',
    titleKey: text('pain-worst.title'),
    hintKey: text('pain-worst.hint'),
    when: [],
    fullOnly: true,
    seconds: 5,
    askedFor: null,
  },
  followUps.painMedicine,
  {
    id: 'swelling',
    kind: 'single',
    key: 'swelling',
    titleKey: text('swelling.title'),
    choices: [
      { code: 'less', textKey: text('swelling.less') },
      { code: 'same', textKey: text('swelling.same') },
      { code: 'more', textKey: text('swelling.more') },
      { code: 'much-more', textKey: text('swelling.much-more') },
      { code: 'none', textKey: text('swelling.none') },
    ],
    severity: ['none', 'less', 'same', 'more', 'much-more'],
    when: [],
    fullOnly: true,
    seconds: 6,
    askedFor: null,
  },
  followUps.swellingWhere,
  followUps.swellingColour,
  {
    id: 'sling',
    kind: 'several',
    key: 'sling',
    titleKey: text('sling.title'),
    choices: [
      { code: 'sling-off-more', textKey: text('sling.sling-off-more'), needsPrecaution: 'sling' },
      { code: 'slept-without', textKey: text('sling.slept-without'), needsPrecaution: 'sling' },
      { code: 'held-off', textKey: text('sling.held-off') },
    ],
    alone: { code: 'as-advised', textKey: text('sling.as-advised'), place: 'first', noneKey: null },
    when: [],
    fullOnly: true,
    needsPrecautions: true,
    seconds: 6,
    askedFor: 'The clinician sees it in the case; "held off" asks which and what followed.',
  },
  followUps.heldOff,
  followUps.heldOffSince,
  {
    id: 'danger',
    kind: 'several',
    key: 'danger',
    titleKey: text('danger.title'),
    choices: dangerCodes.map((code) => ({ code, textKey: text(`danger.${code}`) })),
    alone: { code: 'none', textKey: text('none-of-these'), place: 'last', noneKey: 'dangerNone' },
    when: [],
    fullOnly: false,
    seconds: 12,
    askedFor: null,
  },
  followUps.chestWhen,
  followUps.faintedWhen,
  {
    id: 'anything-else',
    kind: 'tiles',
    key: 'symptoms',
    titleKey: text('anything-else.title'),
    tiles: [tile('shoulder'), tile('hand'), tile('wound'), tile('leg'), tile('wellbeing')],
    alone: { code: 'none', textKey: text('none-of-these'), place: 'last', noneKey: 'symptomsNone' },
    when: [],
    fullOnly: false,
    seconds: 9,
    askedFor: null,
  },
  symptomFollowUps.popSigns,
  symptomFollowUps.fallSigns,
  symptomFollowUps.forearmMedicine,
  symptomFollowUps.numbWhere,
  symptomFollowUps.numbSince,
  symptomFollowUps.woundColour,
  symptomFollowUps.woundThickness,
  symptomFollowUps.woundSigns,
  symptomFollowUps.temperature,
  symptomFollowUps.shaking,
  symptomFollowUps.calfSigns,
  symptomFollowUps.selfHarm,
  {
    id: 'review',
    kind: 'note',
    key: 'note',
    titleKey: text('review.title'),
    hintKey: text('review.hint'),
    when: [],
    fullOnly: false,
    seconds: 5,
    askedFor: 'A person reads it with the case.',
  },
];
