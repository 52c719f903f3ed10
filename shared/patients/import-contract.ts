import { z } from 'zod';
import { contract } from '../http/contract.ts';

/** The columns of a pasted list, in the order of the template; the header row names them. */
export const importColumns = [
  'name',
  'email',
  'chart_number',
  'birth_date',
  'phone',
  'address',
  'time_zone',
  'language',
  'dominant_hand',
  'emergency_contact',
  'blood_thinner',
  'allergies',
  'main_medicines',
  'equipment_at_home',
  'procedure',
  'arm',
  'surgery_date',
  'surgeon',
  'approach',
  'subscapularis',
  'biceps',
  'tuberosity',
  'limits',
  'block',
  'dressing_until_day',
  'lead_email',
  'consent_on',
  'consent_how',
] as const;

export const importLimits = { rows: 500, characters: 300_000 } as const;

const importText = z
  .string()
  .min(1, 'Paste the list first.')
  .max(importLimits.characters, 'The list is too long: enrol it in parts.');

const importPreview = z.object({
  rows: z.array(
    z.object({
      /** The line in what was pasted; the header is line 1. */
      line: z.number().int(),
      name: z.string(),
      chartNumber: z.string(),
      surgeryDate: z.string(),
      lead: z.string(),
      errors: z.array(z.object({ column: z.string(), message: z.string() })),
      /** Somebody with this chart number or e-mail is enrolled already: the row is left out. */
      alreadyEnrolled: z.boolean(),
    }),
  ),
  /** What is wrong with the list as a whole, as an unknown or missing column. */
  problems: z.array(z.string()),
  /** Rows that would be enrolled. */
  ready: z.number().int(),
});
export type ImportPreview = z.output<typeof importPreview>;

export const previewImport = contract({
  method: 'post',
  path: '/api/patient-imports/preview',
  summary: 'Read a pasted list of patients (CSV, or tabs as from a spreadsheet) and say what would happen.',
  status: 200,
  body: z.strictObject({ text: importText }),
  output: importPreview,
});

export const importPatients = contract({
  method: 'post',
  path: '/api/patient-imports',
  summary: 'Enrol every row of the list, or none where one is not right. Sending it twice enrols once.',
  status: 201,
  body: z.strictObject({
    text: importText,
    invite: z.enum(['email', 'not-yet'], 'Choose how they are invited.'),
  }),
  output: z.object({ enrolled: z.number().int(), alreadyEnrolled: z.number().int() }),
});
