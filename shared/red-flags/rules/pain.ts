import { aTime, defineRule, inWords, yesNo } from '../rule.ts';

const painQuestions = [
  inWords('Where is it, and since when?'),
  inWords('Which medicine, how much, and when last?'),
  yesNo('Did it help?'),
  yesNo('A pop, a fall or a change of shape?'),
  yesNo('Hot, red or wet wound, or a fever?'),
  yesNo('Numb, weak or cold hand?'),
  inWords('What was done more than usual?'),
];

const painUncontrolled = defineRule({
  code: 'pain-uncontrolled',
  version: 1,
  on: true,
  parameters: { worstFrom: 9, medicineThatFails: ['no', 'not-sure'] },
  urgency: 'urgent',
  pause: null,
  grades: [],
  source: 'Default of ours.',
  mark: 'default',
  clinicianText: 'Worst pain 9 or 10 and medicine does not bring it down, or the person is not sure.',
  callSheet: [...painQuestions.slice(0, 6), aTime('When may the next dose be taken?')],
  detect: ({ answers }, { worstFrom, medicineThatFails }) => {
    const { painWorst, painMedicine } = answers;
    return painWorst !== undefined &&
      painWorst >= worstFrom &&
      painMedicine !== undefined &&
      medicineThatFails.some((code) => code === painMedicine)
      ? { values: { painWorst, medicine: painMedicine } }
      : null;
  },
});

const painSevere = defineRule({
  code: 'pain-severe',
  version: 1,
  on: true,
  parameters: { nowFrom: 7, afterDay: 3 },
  urgency: 'same-day',
  pause: null,
  grades: [],
  source: 'Default of ours. Pain peaks about day 2 at 5.1 ± 2.7: daily-diary study of 14 days.',
  mark: 'default',
  clinicianText: 'Pain now 7 or more after day 3.',
  callSheet: painQuestions,
  detect: ({ answers: { painNow }, day }, { nowFrom, afterDay }) =>
    painNow !== undefined && painNow >= nowFrom && day > afterDay ? { values: { painNow } } : null,
});

const painRise = defineRule({
  code: 'pain-rise',
  version: 1,
  on: true,
  parameters: { nowFrom: 5, rise: 2, afterDay: 3 },
  urgency: 'same-day',
  pause: null,
  grades: [],
  source: 'Default of ours. The change of 2 points: Farrar et al., Pain 2001;94:149-158, from memory.',
  mark: 'default',
  clinicianText: 'Pain now 5 or more and at least 2 above the mean of the last 3 check-ins, after day 3.',
  callSheet: painQuestions,
  detect: ({ answers: { painNow }, painRise: rise, day }, parameters) =>
    painNow !== undefined &&
    painNow >= parameters.nowFrom &&
    rise !== null &&
    rise >= parameters.rise &&
    day > parameters.afterDay
      ? { values: { painNow } }
      : null,
});

export const painRules = { painUncontrolled, painSevere, painRise };
