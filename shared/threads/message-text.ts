import { z } from 'zod';

const controlCharacters = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F]/u;

/** Text as people write it: something must be there; of control characters only line breaks and tabs may. */
export const messageText = z
  .string()
  .trim()
  .min(1, 'Write something first.')
  .max(8000, 'A message holds at most 8,000 characters.')
  .refine((text) => !controlCharacters.test(text), 'This holds characters that cannot be sent.');
