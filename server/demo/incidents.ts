import type { Answers } from '#shared/check-ins/answers.ts';
import type { Outcome } from '#shared/triage/lifecycle.ts';
import type { Random } from './random.ts';

/** How a flag of the past was closed. A reply stands in the flag's own thread. */
export type Resolution = {
  outcome: Outcome;
  worthRaising: 'yes' | 'no';
  note: string | null;
  reply: string | null;
};

/** Something that went otherwise than usual on one day, and how the clinic has dealt with it. */
type Incident = {
  /** The days after surgery between which it can happen. */
  fromDay: number;
  untilDay: number;
  answers: (usual: { painNow: number }, random: Random) => Answers;
  resolutions: readonly [Resolution, ...Resolution[]];
};

const byPhone = (note: string, worthRaising: 'yes' | 'no' = 'yes'): Resolution => ({
  outcome: 'advised-by-phone',
  worthRaising,
  note,
  reply: null,
});

const byMessage = (reply: string, worthRaising: 'yes' | 'no' = 'yes'): Resolution => ({
  outcome: 'advised-by-message',
  worthRaising,
  note: null,
  reply,
});

const noAction = (note: string): Resolution => ({
  outcome: 'no-action-needed',
  worthRaising: 'no',
  note,
  reply: null,
});

const raised = (usual: { painNow: number }, by: number): Answers => {
  const painNow = Math.min(8, Math.max(5, Math.ceil(usual.painNow) + by));
  return { painNow, painWorst: Math.min(8, painNow + 1) };
};

/** From the most ordinary to the rarest; the first ones are drawn more often. */
const incidents: readonly [Incident, ...Incident[]] = [
  {
    fromDay: 1,
    untilDay: 120,
    answers: () => ({ symptoms: ['call-me'] }),
    resolutions: [
      byPhone('Question about the next visit; answered.', 'no'),
      byPhone('Wanted to go through the sling straps once more. Clear now.'),
    ],
  },
  {
    fromDay: 5,
    untilDay: 120,
    answers: (usual) => ({
      ...raised(usual, 2),
      note: 'Did more around the house yesterday than I should have.',
    }),
    resolutions: [
      byPhone('Overdid the housework. Half the repetitions for two days, then as before.'),
      byMessage(
        'Thank you for telling us. Halve the repetitions today and tomorrow, ice twice, and keep to the hold-off list. If it is not back to your usual by the day after tomorrow, tell us.',
      ),
    ],
  },
  {
    fromDay: 2,
    untilDay: 12,
    answers: () => ({ symptoms: ['bowels'] }),
    resolutions: [
      byMessage(
        'That is common with the strong pain medicine. Please ask your pharmacist or your own doctor what suits you, drink plenty, and tell us if your belly hurts or you feel sick.',
      ),
      byPhone('Opioid down to one at night; has a laxative from the pharmacist.'),
    ],
  },
  {
    fromDay: 4,
    untilDay: 21,
    answers: () => ({
      symptoms: ['wound-fluid'],
      woundColour: 'clear',
      woundThickness: 'thin',
      woundSigns: ['none'],
    }),
    resolutions: [
      byPhone('A few clear drops on the dressing, no redness, no fever. Look again at the visit.'),
      {
        outcome: 'visit-brought-forward',
        worthRaising: 'yes',
        note: 'Seen the same afternoon, wound dry.',
        reply: null,
      },
    ],
  },
  {
    fromDay: 8,
    untilDay: 100,
    answers: () => ({ symptoms: ['hand-tingling'], numbWhere: 'fingers', numbSince: 'came-later' }),
    resolutions: [
      byPhone('Only on waking, gone after loosening the sling strap at the elbow.'),
      noAction('Slept on the hand; gone within minutes.'),
    ],
  },
  {
    fromDay: 6,
    untilDay: 90,
    answers: () => ({
      symptoms: ['fall'],
      fallSigns: ['none'],
      note: 'Sat down hard on the back step, nothing hurts.',
    }),
    resolutions: [
      byPhone('Slid off the back step, no blow to arm or head, as before since. Handrail advised.'),
    ],
  },
  {
    fromDay: 10,
    untilDay: 80,
    answers: () => ({ symptoms: ['knock'], note: 'Bumped the elbow on the door frame.' }),
    resolutions: [noAction('Light bump of the elbow, pain and use unchanged.')],
  },
  {
    fromDay: 3,
    untilDay: 60,
    answers: () => ({ symptoms: ['calf'], calfSigns: 'sore' }),
    resolutions: [
      byPhone('Sore after the first long walk, both calves alike, no swelling. Told what to watch for.'),
    ],
  },
  {
    fromDay: 3,
    untilDay: 20,
    answers: (_, random) => ({
      symptoms: ['hot'],
      temperature: { unit: 'F', tenths: random.int(1004, 1008) },
      shaking: 'no',
    }),
    resolutions: [byPhone('Also a cold with a cough; wound dry and pale. Normal again the next morning.')],
  },
  {
    fromDay: 20,
    untilDay: 90,
    answers: () => ({ symptoms: ['pop-or-slip'], popSigns: ['none'] }),
    resolutions: [byPhone('One click while turning in bed; shape, strength and pain as before.')],
  },
  {
    fromDay: 12,
    untilDay: 70,
    answers: (usual) => ({ ...raised(usual, 3), symptoms: ['fall'], fallSigns: ['on-arm', 'hurts-more'] }),
    resolutions: [
      {
        outcome: 'surgeons-office-informed',
        worthRaising: 'yes',
        note: 'Spoke to Edith Marlowe at the surgeon’s office; X-ray the same day, implant in place.',
        reply: null,
      },
    ],
  },
  {
    fromDay: 5,
    untilDay: 60,
    answers: () => ({ symptoms: ['hand-weak'] }),
    resolutions: [
      byPhone('Grip tired after cooking, wrist and fingers full strength when asked to show it.'),
    ],
  },
  {
    fromDay: 10,
    untilDay: 50,
    answers: () => ({ danger: ['chest-or-breathing'], chestWhen: 'earlier' }),
    resolutions: [byPhone('Known heartburn four days ago after supper, gone since; own doctor knows.')],
  },
];

/** An incident that can happen on that day, the ordinary ones far more often; null where there is none. */
export const drawIncident = (day: number, random: Random): Incident | null => {
  const [first, ...rest] = incidents.filter(({ fromDay, untilDay }) => day >= fromDay && day <= untilDay);
  if (!first) return null;
  const possible = [first, ...rest];
  return possible[Math.floor(possible.length * random.next() ** 1.7)] ?? first;
};
