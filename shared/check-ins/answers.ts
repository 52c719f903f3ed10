import { z } from 'zod';
import { noteMaxCharacters } from './note-length.ts';
import { dangerCodes, symptomCodes } from './symptoms.ts';

const pain = z.number().int().min(0).max(10);
const yesNoNotSure = z.enum(['yes', 'no', 'not-sure']);
const when = z.enum(['now', 'last-2-days', 'earlier']);

/** Precautions are versioned data of a plan, so only the shape of their codes is held here. */
const precautionCode = z.string().regex(/^[a-z][a-z-]{1,59}$/);

/**
 * A temperature in tenths of the unit it was entered in. It is never converted: 37.95 °C and 100.3 °F would
 * otherwise change sides at a threshold by rounding.
 */
const temperature = z.discriminatedUnion('unit', [
  z.strictObject({ unit: z.literal('C'), tenths: z.number().int().min(300).max(450) }),
  z.strictObject({ unit: z.literal('F'), tenths: z.number().int().min(860).max(1130) }),
]);

/**
 * The answers of one check-in, by question. Every question is optional: a missing answer is unknown, never
 * "no". Answers to follow-ups without their question are allowed and have no effect; `pruneAnswers` drops them.
 */
export const answersSchema = z.strictObject({
  painNow: pain.optional(),
  painWorst: pain.optional(),
  painMedicine: z.enum(['yes', 'a-little', 'no', 'none-taken', 'not-sure']).optional(),
  swelling: z.enum(['none', 'less', 'same', 'more', 'much-more']).optional(),
  swellingWhere: z.enum(['shoulder', 'whole-arm']).optional(),
  /** Tight, blue, red or purple. */
  swellingColour: yesNoNotSure.optional(),
  sling: z
    .array(z.enum(['as-advised', 'sling-off-more', 'slept-without', 'held-off']))
    .max(4)
    .optional(),
  heldOff: z.array(precautionCode).max(30).optional(),
  heldOffSince: z.enum(['no-different', 'hurts-more', 'other']).optional(),
  danger: z.array(z.enum(dangerCodes)).max(dangerCodes.length).optional(),
  dangerNone: z.literal(true).optional(),
  chestWhen: when.optional(),
  faintedWhen: when.optional(),
  symptoms: z.array(z.enum(symptomCodes)).max(symptomCodes.length).optional(),
  symptomsNone: z.literal(true).optional(),
  popSigns: z
    .array(z.enum(['looks-different', 'hurts-much-more', 'cannot-use-hand', 'hand-numb-or-cold', 'none']))
    .max(5)
    .optional(),
  fallSigns: z
    .array(z.enum(['hit-head', 'knocked-out', 'on-arm', 'cannot-stand', 'hurts-more', 'none']))
    .max(6)
    .optional(),
  woundColour: z.enum(['clear', 'pink', 'red', 'yellow', 'green', 'cloudy', 'not-sure']).optional(),
  woundThickness: z.enum(['thin', 'thick', 'not-sure']).optional(),
  woundSigns: z
    .array(z.enum(['opened', 'smell', 'soaked-through', 'none']))
    .max(4)
    .optional(),
  temperature: z.union([temperature, z.literal('not-measured')]).optional(),
  shaking: yesNoNotSure.optional(),
  numbWhere: z.enum(['hand', 'fingers', 'outer-arm', 'beside-scar', 'not-sure']).optional(),
  numbSince: z.enum(['since-surgery', 'came-later', 'not-sure']).optional(),
  calfSigns: z.enum(['sore', 'swollen', 'both']).optional(),
  /** Thoughts of self-harm, in words of our own; no licensed item. */
  selfHarm: yesNoNotSure.optional(),
  note: z.string().max(noteMaxCharacters).optional(),
});

export type Answers = z.infer<typeof answersSchema>;
export type AnswerKey = keyof Answers;
export type Temperature = z.infer<typeof temperature>;
