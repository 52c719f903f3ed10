import { z } from 'zod';

/** Fields that several forms share. Messages are shown as they are. */
export const emailField = z
  .string()
  .trim()
  .min(1, 'Enter an e-mail address.')
  .max(254, 'That e-mail address is too long.')
  .regex(
    /^[^\s@<>()[\]\\,;:"]+@[^\s@<>()[\]\\,;:"]+\.[^\s@<>()[\]\\,;:"]+$/u,
    'That is not an e-mail address.',
  );

export const nameField = z
  .string()
  .trim()
  .min(1, 'Enter a name.')
  .max(120, 'That name is too long: 120 characters at most.');

/** Read with the clinic's country where it has no country code; the server says where it is no number. */
export const phoneField = z.string().trim().min(1, 'Enter a telephone number.').max(40, 'That is too long.');

/** A zone of the IANA database, as the runtime knows it. */
export const timeZoneField = z
  .string()
  .refine(isTimeZone, 'That is not a time zone. Choose one, such as America/New_York.');

function isTimeZone(name: string): boolean {
  // Area and place: runtimes know shorter and older names too, which databases read otherwise or not at all.
  if (name !== 'UTC' && !/^(?!SystemV\/)[A-Z][A-Za-z_]+\/[\w+/-]+$/.test(name)) return false;
  try {
    return new Intl.DateTimeFormat('en-US', { timeZone: name }) instanceof Intl.DateTimeFormat;
  } catch {
    return false;
  }
}

export const reasonField = z
  .string()
  .trim()
  .min(3, 'Say why, in a few words.')
  .max(500, 'That is too long: 500 characters at most.');

export const passwordRules = { shortest: 15, longest: 128 } as const;

/** Code points in NFC; what is common is for the server to say. */
export const newPasswordField = z
  .string()
  .transform((text) => text.normalize('NFC'))
  .refine((text) => [...text].length >= passwordRules.shortest, {
    message: `Use ${passwordRules.shortest} characters or more. A few words in a row are easy to remember.`,
  })
  .refine((text) => [...text].length <= passwordRules.longest, {
    message: `Use ${passwordRules.longest} characters at most.`,
  });

/** What a browser made of a WebAuthn ceremony; the server verifies it. */
export const passkeyAnswer = z.strictObject({
  challengeId: z.uuid(),
  response: z.record(z.string(), z.unknown()),
});

/** What a page hands to the browser to begin a WebAuthn ceremony. */
export const passkeyQuestion = z.object({
  challengeId: z.uuid(),
  options: z.record(z.string(), z.unknown()),
});
