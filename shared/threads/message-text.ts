import { z } from 'zod';

const tab = 9;
const lineFeed = 10;
const carriageReturn = 13;
const firstPrintable = 32;
const deleteCharacter = 127;

const isControl = (character: string): boolean => {
  const code = character.codePointAt(0) ?? 0;
  return code < firstPrintable || code === deleteCharacter;
};

const isLineBreakOrTab = (character: string): boolean =>
  [tab, lineFeed, carriageReturn].includes(character.codePointAt(0) ?? 0);

const unsendable = 'This holds characters that cannot be sent.';

/** Format characters alone, as zero-width spaces are, say nothing. */
const saysSomething = (text: string): boolean => text.replaceAll(/[\p{Cf}\s]/gu, '') !== '';

/** Text as people write it: something must be there; of control characters only line breaks and tabs may. */
export const messageText = z
  .string()
  .trim()
  .max(8000, 'A message holds at most 8,000 characters.')
  .refine(saysSomething, 'Write something first.')
  .refine((text) => [...text].every((one) => !isControl(one) || isLineBreakOrTab(one)), unsendable);

/** The marks that turn the direction of everything after them (Unicode Standard Annex 9). */
const directionOverrides = /[\u202A-\u202E\u2066-\u2069]/u;

/** One line, as a subject is: no line breaks, no control characters, nothing that turns the line around. */
export const subjectLine = z
  .string()
  .trim()
  .max(120, 'At most 120 characters.')
  .refine(saysSomething, 'Say in a few words what it is about.')
  .refine((text) => ![...text].some(isControl) && !directionOverrides.test(text), unsendable);
