import { z } from 'zod';
import { emailField, nameField, phoneField, timeZoneField } from '../accounts/fields.ts';

export const procedures = [
  'reverse-replacement',
  'anatomic-replacement',
  'cuff-repair',
  'fracture-fixation',
  'fracture-replacement',
] as const;
export const arms = ['left', 'right'] as const;
export const approaches = ['deltopectoral', 'deltoid-split'] as const;
export const subscapularisWays = ['repaired', 'not-repaired', 'osteotomy'] as const;
export const bicepsWays = ['left', 'tenodesis'] as const;
export const blocks = ['none', 'single', 'long-acting'] as const;
export const consentWays = ['signed', 'spoken'] as const;

const localDate = (missing: string) => z.iso.date(missing);
const line = (longest: number) =>
  z.string().trim().max(longest, `That is too long: ${longest} characters at most.`);
/** Null where nobody has asked; an empty line is nobody's answer. */
const fact = line(300)
  .transform((text) => (text === '' ? null : text))
  .nullable();

/** Who the patient is, and the safety facts that stand at the head of every case. */
export const identityFields = {
  name: nameField,
  email: emailField,
  chartNumber: line(40).min(1, 'Enter the chart number.'),
  birthDate: localDate('Enter the date of birth.'),
  phone: phoneField,
  address: line(300).min(1, 'Enter the address.'),
  timeZone: timeZoneField,
  language: line(60).min(1, 'Enter the language.'),
  dominantHand: z.enum(arms, 'Choose the dominant hand.'),
  emergencyContact: line(200).min(1, 'Enter whom to call, and the number.'),
  /** Its name; 'none' when asked and none is taken; null where nobody has asked: then it counts as one. */
  bloodThinner: fact,
  allergies: fact,
  mainMedicines: fact,
  equipmentAtHome: fact,
};

export const operationCardFields = {
  procedure: z.enum(procedures, 'Choose the procedure.'),
  arm: z.enum(arms, 'Choose the operated arm.'),
  surgeryDate: localDate('Enter the date of surgery.'),
  surgeon: line(120).min(1, 'Enter the surgeon.'),
  approach: z.enum(approaches, 'Choose the approach.'),
  subscapularis: z.enum(subscapularisWays, 'Choose what was done to the subscapularis.'),
  biceps: z.enum(bicepsWays, 'Choose what was done to the biceps.'),
  tuberosity: fact,
  limits: fact,
  block: z.enum(blocks, 'Choose the nerve block.'),
  dressingUntilDay: z
    .number('Enter the day until which the dressing stays.')
    .int('A whole number of days.')
    .min(0, 'Not before the day of surgery.')
    .max(60, 'Sixty days at most.'),
};

export const careTeamField = z
  .array(z.strictObject({ personId: z.uuid(), isLead: z.boolean() }))
  .min(1, 'Choose at least one clinician.')
  .refine((team) => team.filter(({ isLead }) => isLead).length === 1, 'Choose one lead therapist.')
  .refine(
    (team) => new Set(team.map(({ personId }) => personId)).size === team.length,
    'Somebody is on the team twice.',
  );

export const consentFields = z.strictObject({
  on: localDate('Enter when the patient agreed.'),
  how: z.enum(consentWays, 'Choose how the patient agreed.'),
});
