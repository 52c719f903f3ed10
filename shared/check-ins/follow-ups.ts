import { choicesOf, medicineCodes, medicineSeverity, noNotSureYes, text, yesNoNotSure } from './choices.ts';
import type { Condition, Screen } from './screens.ts';
import type { DangerCode } from './symptoms.ts';

const dangerSign = (...has: DangerCode[]): Condition => ({ key: 'danger', has });
const moreSwelling: Condition = { key: 'swelling', has: ['more', 'much-more'] };
const brokeAPrecaution: Condition = { key: 'sling', has: ['held-off'] };
const whenCodes = ['now', 'last-2-days', 'earlier'] as const;
const whenSeverity = ['earlier', 'last-2-days', 'now'] as const;

export const painAtItsWorst: Condition = { key: 'painWorst', atLeast: 9 };

/** One screen each, asked only when what they follow was picked (domain, section 3). */
export const followUps = {
  painMedicine: {
    id: 'pain-medicine',
    kind: 'single',
    key: 'painMedicine',
    titleKey: text('pain-medicine.title'),
    choices: choicesOf('pain-medicine', medicineCodes),
    severity: medicineSeverity,
    when: [painAtItsWorst],
    fullOnly: true,
    seconds: 5,
    askedFor: null,
  },
  swellingWhere: {
    id: 'swelling-where',
    kind: 'single',
    key: 'swellingWhere',
    titleKey: text('swelling-where.title'),
    choices: choicesOf('swelling-where', ['shoulder', 'whole-arm']),
    severity: ['shoulder', 'whole-arm'],
    when: [moreSwelling],
    fullOnly: true,
    seconds: 5,
    askedFor: null,
  },
  swellingColour: {
    id: 'swelling-colour',
    kind: 'single',
    key: 'swellingColour',
    titleKey: text('swelling-colour.title'),
    choices: choicesOf('swelling-colour', yesNoNotSure),
    severity: noNotSureYes,
    when: [moreSwelling, { key: 'swellingWhere', has: ['whole-arm'] }],
    fullOnly: true,
    seconds: 5,
    askedFor: null,
  },
  heldOff: {
    id: 'held-off',
    kind: 'precautions',
    key: 'heldOff',
    titleKey: text('held-off.title'),
    alone: { code: 'not-sure', textKey: text('held-off.not-sure'), place: 'last', noneKey: null },
    when: [brokeAPrecaution],
    fullOnly: true,
    needsPrecautions: true,
    seconds: 8,
    askedFor: 'The clinician sees in the case which precaution it was.',
  },
  heldOffSince: {
    id: 'held-off-since',
    kind: 'single',
    key: 'heldOffSince',
    titleKey: text('held-off-since.title'),
    choices: choicesOf('held-off-since', ['no-different', 'hurts-more', 'other']),
    severity: ['no-different', 'other', 'hurts-more'],
    when: [brokeAPrecaution],
    fullOnly: true,
    needsPrecautions: true,
    seconds: 5,
    askedFor: null,
  },
  chestWhen: {
    id: 'chest-when',
    kind: 'single',
    key: 'chestWhen',
    titleKey: text('chest-when.title'),
    choices: choicesOf('chest-when', whenCodes),
    severity: whenSeverity,
    when: [dangerSign('chest-or-breathing')],
    fullOnly: false,
    seconds: 5,
    askedFor: null,
  },
  faintedWhen: {
    id: 'fainted-when',
    kind: 'single',
    key: 'faintedWhen',
    titleKey: text('fainted-when.title'),
    choices: choicesOf('fainted-when', whenCodes),
    severity: whenSeverity,
    when: [dangerSign('fainted-or-coughed-blood')],
    fullOnly: false,
    seconds: 5,
    askedFor: null,
  },
} satisfies Record<string, Screen>;
