import { pruneAnswers } from '#shared/check-ins/answering.ts';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { Random } from './random.ts';

/** What decides which questions a day's check-in asks, and what an ordinary answer to them is. */
type DayOfAnswers = {
  day: number;
  block: 'none' | 'single' | 'long-acting';
  precautionsInForce: readonly string[];
  /** Expected pain with the day's ups and downs. */
  pain: number;
};

const notes = [
  'Slept a little better last night.',
  'Tried the recliner with two pillows, that helped.',
  'My neighbor did the shopping for me.',
  'Ice after the exercises works well.',
  'Getting the shirt on still takes a while.',
  'A bit tired today, otherwise fine.',
  'First walk around the block since surgery!',
  'The elbow feels stiff in the morning and loosens up by noon.',
  'Took the medicine before the exercises as you said.',
  'Made my own coffee today.',
] as const;

const clamp = (value: number): number => Math.min(10, Math.max(0, Math.round(value)));

const swellingOn = (day: number, random: Random): Pick<Answers, 'swelling' | 'swellingWhere'> => {
  if (day <= 4 && random.chance(0.35)) return { swelling: 'more', swellingWhere: 'shoulder' };
  if (random.chance(0.02)) return { swelling: 'more', swellingWhere: 'shoulder' };
  if (day > 35) return { swelling: random.chance(0.7) ? 'none' : 'same' };
  return { swelling: random.pick(['less', 'same', 'same']) };
};

const slingOn = (
  inForce: readonly string[],
  random: Random,
): Pick<Answers, 'sling' | 'heldOff' | 'heldOffSince'> => {
  if (inForce.length === 0) return {};
  const others = inForce.filter((code) => code !== 'sling');
  const [first, ...rest] = others;
  if (first !== undefined && random.chance(0.03)) {
    return { sling: ['held-off'], heldOff: [random.pick([first, ...rest])], heldOffSince: 'no-different' };
  }
  if (inForce.includes('sling') && random.chance(0.09)) {
    return { sling: [random.pick(['sling-off-more', 'sling-off-more', 'slept-without'])] };
  }
  return { sling: ['as-advised'] };
};

/** What a person mentions and no rule minds: a block that has not worn off, a hot feeling without a fever. */
const harmlessSymptoms = ({ day, block }: DayOfAnswers, random: Random): Answers => {
  if (day <= 2 && block !== 'none' && random.chance(0.4)) {
    return { symptoms: ['hand-numb'], numbWhere: 'fingers', numbSince: 'since-surgery' };
  }
  if (day <= 21 && random.chance(0.01)) {
    return { symptoms: ['hot'], temperature: { unit: 'F', tenths: random.int(981, 995) }, shaking: 'no' };
  }
  return { symptomsNone: true };
};

/** Lays answers over those of an ordinary day, and drops what is then no longer asked. */
export const withAnswers = (ordinary: Answers, changed: Answers): Answers =>
  pruneAnswers({ ...ordinary, ...changed });

/** The whole check-in of a day on which nothing is wrong. */
export const ordinaryAnswers = (on: DayOfAnswers, random: Random): Answers => {
  const painNow = clamp(on.pain);
  const painWorst = clamp(painNow + random.pick([1, 1, 2, 2, 3]));
  return {
    painNow,
    painWorst,
    ...(painWorst >= 9 ? { painMedicine: random.pick(['yes', 'a-little']) } : {}),
    ...swellingOn(on.day, random),
    ...slingOn(on.precautionsInForce, random),
    dangerNone: true,
    ...harmlessSymptoms(on, random),
    ...(random.chance(0.06) ? { note: random.pick(notes) } : {}),
  };
};

/** The same with a point less of pain, where it was by chance so much that a rule would mind. */
export const easedAnswers = (answers: Answers): Answers => {
  const painNow = clamp((answers.painNow ?? 0) - 1);
  const painWorst = Math.min(8, Math.max(painNow, (answers.painWorst ?? 0) - 1));
  return withAnswers(answers, { painNow, painWorst });
};
