import type { Answers } from '#shared/check-ins/answers.ts';
import { addDays, type LocalDate } from '#shared/plans/calendar.ts';
import type { Resolution } from './incidents.ts';
import { clock, isWorkingDay, workingDayBefore } from './moments.ts';
import type { StaffKey } from './staff.ts';

/** What has become of a flag, all on the day it was raised: times are minutes after midnight. */
export type Handling = {
  by: StaffKey;
  seenAt: number;
  claimedAt?: number;
  reply?: { at: number; text: string };
  closed?: { at: number; resolution: Resolution };
};

export type ScriptedCheckIn = {
  date: LocalDate;
  minutes: number;
  kind: 'daily' | 'something-new';
  /** Laid over an ordinary day's answers; the whole of them for something new. */
  answers: Answers;
  /** Sent at the tick, this long before the check-in was finished. */
  alert?: { answers: Answers; secondsBefore: number };
  handling?: Handling;
};

/** What is told of one person; the rest of their days is drawn. */
export type Script = {
  /** The share of days with a check-in, where it is not drawn. */
  adherence?: number;
  missed?: readonly LocalDate[];
  /** No check-in from this date on. */
  silentFrom?: LocalDate;
  /** Nothing but what is told here goes otherwise than usual. */
  uneventful?: boolean;
  /** Answered exactly so on the last three days before today: the person's own usual. */
  usual?: { painNow: number; painWorst: number };
  checkIns?: readonly ScriptedCheckIn[];
};

/** A clinician of the patient's own on working days, the nurse on call on others. */
export const onDuty = (lead: StaffKey, date: LocalDate): StaffKey => (isWorkingDay(date) ? lead : 'dov');

/** The morning on which Ines found her dressing damp. */
const dampDressingDate = (today: LocalDate): LocalDate => workingDayBefore(today, 4);

const dampDressing: Resolution = {
  outcome: 'visit-brought-forward',
  worthRaising: 'yes',
  note: 'Came in at 14:00. Wound closed and pale, a little pink fluid on the old dressing; changed, dry since.',
  reply: null,
};

const chestPain = { danger: ['chest-or-breathing' as const] };
const beforeTheTick: Answers = { painNow: 5, painWorst: 6, swelling: 'same', sling: ['as-advised'] };

/** The scenario: this morning's round, the people with accounts, and those who have gone silent. */
export const scenarioOn = (today: LocalDate): Record<string, Script> => {
  const back = (days: number): LocalDate => addDays(today, -days);
  const thisMorning = (
    time: `${number}:${number}`,
    answers: Answers,
    more: Pick<ScriptedCheckIn, 'alert' | 'handling'> = {},
  ): ScriptedCheckIn => ({ date: today, minutes: clock(time), kind: 'daily', answers, ...more });
  const handledBy = (lead: StaffKey, seen: `${number}:${number}`, claimed: `${number}:${number}`) => ({
    by: onDuty(lead, today),
    seenAt: clock(seen),
    claimedAt: clock(claimed),
  });

  return {
    'Ines Valcourt': {
      adherence: 1,
      missed: [today, back(10), back(16)],
      uneventful: true,
      usual: { painNow: 4, painWorst: 6 },
      checkIns: [
        {
          date: dampDressingDate(today),
          minutes: clock('7:10'),
          kind: 'daily',
          answers: {
            symptoms: ['wet-dressing'],
            woundColour: 'pink',
            woundThickness: 'thin',
            woundSigns: ['none'],
            note: 'The dressing was damp this morning.',
          },
          handling: {
            by: 'noor',
            seenAt: clock('8:02'),
            claimedAt: clock('8:03'),
            closed: { at: clock('14:40'), resolution: dampDressing },
          },
        },
      ],
    },
    'Tobias Ahlgren': {
      adherence: 0.9,
      missed: [today],
      uneventful: true,
      usual: { painNow: 3, painWorst: 5 },
    },
    'Wendell Pryce': {
      uneventful: true,
      usual: { painNow: 5, painWorst: 6 },
      checkIns: [
        thisMorning(
          '8:42',
          {
            ...beforeTheTick,
            ...chestPain,
            chestWhen: 'now',
            note: 'Tight across the chest since I got up.',
          },
          {
            alert: { answers: { ...beforeTheTick, ...chestPain }, secondsBefore: 140 },
            handling: { by: 'petra', seenAt: clock('8:41'), claimedAt: clock('8:43') },
          },
        ),
      ],
    },
    'Anselm Okwuosa': {
      usual: { painNow: 3, painWorst: 4 },
      checkIns: [
        thisMorning('6:50', {
          painNow: 8,
          painWorst: 9,
          painMedicine: 'a-little',
          symptoms: ['fall'],
          fallSigns: ['on-arm', 'hurts-more'],
          note: 'Missed the last step with the laundry basket.',
        }),
      ],
    },
    'Leocadia Wolańska-Brzęczyszczykiewicz': {
      usual: { painNow: 4, painWorst: 6 },
      checkIns: [
        thisMorning('7:12', {
          painNow: 5,
          painWorst: 6,
          swelling: 'more',
          swellingWhere: 'shoulder',
          symptoms: ['wound-fluid', 'wet-dressing'],
          woundColour: 'yellow',
          woundThickness: 'thick',
          woundSigns: ['none'],
          note: 'The dressing was damp this morning, yellowish.',
        }),
      ],
    },
    'Þórunn Guðmundsdóttir': {
      usual: { painNow: 3, painWorst: 4 },
      checkIns: [
        thisMorning(
          '7:21',
          { symptoms: ['calf'], calfSigns: 'both' },
          { handling: handledBy('callum', '8:03', '8:05') },
        ),
      ],
    },
    'Rukmini Dass': {
      usual: { painNow: 4, painWorst: 5 },
      checkIns: [
        thisMorning('7:02', { painNow: 6, painWorst: 7, note: 'It has been creeping up all week.' }),
      ],
    },
    'Hal Brandvold': {
      usual: { painNow: 4, painWorst: 5 },
      checkIns: [
        thisMorning('7:30', { symptoms: ['hand-numb'], numbWhere: 'fingers', numbSince: 'came-later' }),
      ],
    },
    'Nguyễn Thị Lan Hương': {
      usual: { painNow: 3, painWorst: 4 },
      checkIns: [
        thisMorning('6:58', {
          symptoms: ['hot'],
          temperature: { unit: 'F', tenths: 1006 },
          shaking: 'no',
        }),
      ],
    },
    'José Ángel Etxeberria Mendizábal': {
      usual: { painNow: 2, painWorst: 4 },
      checkIns: [
        thisMorning('7:44', {
          symptoms: ['pop-or-slip'],
          popSigns: ['none'],
          note: 'A clunk when I turned over in bed. Nothing since.',
        }),
      ],
    },
    'Anahit Ter-Hovhannisyan': {
      usual: { painNow: 6, painWorst: 8 },
      checkIns: [thisMorning('8:11', { painNow: 7, painWorst: 8 })],
    },
    'Zdeněk Hřebíček': {
      usual: { painNow: 2, painWorst: 3 },
      checkIns: [
        thisMorning(
          '7:36',
          { symptoms: ['call-me'], note: 'The brace shop sent a sling in another size.' },
          {
            handling: {
              ...handledBy('callum', '8:20', '8:24'),
              reply: {
                at: clock('8:24'),
                text: 'Good morning, Zdeněk. Please keep wearing the old sling today and do not cut or pin the new one. I will ring you this afternoon and we will sort it out together.',
              },
            },
          },
        ),
      ],
    },
    'Kamalakshi Venkatasubramanian': {
      usual: { painNow: 3, painWorst: 4 },
      checkIns: [
        {
          date: back(1),
          minutes: clock('20:10'),
          kind: 'something-new',
          answers: {
            dangerNone: true,
            symptoms: ['fall'],
            fallSigns: ['none'],
            note: 'Slipped on the porch and sat down. My son was there. Nothing hurts more than before.',
          },
          handling: { by: 'dov', seenAt: clock('20:26') },
        },
      ],
    },
    'Marguerite Oyelaran': { checkIns: [thisMorning('8:03', {})] },
    'Soledad Quiroga': { checkIns: [thisMorning('6:41', {})] },
    'Birgit Falk': { checkIns: [thisMorning('8:15', {})] },
    'Ilse Dörflinger': { checkIns: [thisMorning('9:20', {})] },
    'Gwen Thackeray': { silentFrom: back(3) },
    'Vaiola Fonoimoana': { silentFrom: back(2) },
    'Ignatius Papadimitriou': { silentFrom: back(5) },
    'Desmond Achterberg': { silentFrom: back(2) },
    'Gerhardt Weißenbacher': { silentFrom: back(8) },
    'Oskar Tällberg': { silentFrom: back(6) },
  };
};
