import { z } from 'zod';
import type { enrolPatientBody, PatientRecord } from '#shared/patients/contract.ts';
import { identityFields } from '#shared/patients/record.ts';

/** What the parts of a patient's form share; the form that changes a record has no consent and no invitation. */
export type PatientValues = z.input<typeof enrolPatientBody>;

/**
 * As the route takes it, but for the blood thinner: an empty line would count as "nobody has asked", and here
 * that is an answer of its own (null). Empty means that nothing was chosen, or that its name is missing.
 */
export const identityForm = z.strictObject({
  ...identityFields,
  bloodThinner: z
    .string()
    .trim()
    .min(1, 'Choose: none, which one, or not asked.')
    .max(300, 'That is too long: 300 characters at most.')
    .nullable(),
});

/** Nothing that matters is chosen by itself; the clinic's time zone is right for nearly everybody. */
export const emptyIdentity = (timeZone: string) => ({
  name: '',
  email: '',
  chartNumber: '',
  birthDate: '',
  phone: '',
  address: '',
  timeZone,
  language: '',
  emergencyContact: '',
  bloodThinner: '',
  allergies: '',
  mainMedicines: '',
  equipmentAtHome: '',
});

export const emptyOperation = { surgeryDate: '', surgeon: '', tuberosity: '', limits: '' };

/** The record as the form that changes it begins with it. */
export function valuesOf({ identity, operation, careTeam }: PatientRecord) {
  return {
    identity: {
      ...identity,
      allergies: identity.allergies ?? '',
      mainMedicines: identity.mainMedicines ?? '',
      equipmentAtHome: identity.equipmentAtHome ?? '',
    },
    operation: {
      procedure: operation.procedure,
      arm: operation.arm,
      surgeryDate: operation.surgeryDate,
      surgeon: operation.surgeon,
      approach: operation.approach,
      subscapularis: operation.subscapularis,
      biceps: operation.biceps,
      tuberosity: operation.tuberosity ?? '',
      limits: operation.limits ?? '',
      block: operation.block,
      dressingUntilDay: operation.dressingUntilDay,
    },
    careTeam: careTeam.map(({ personId, isLead }) => ({ personId, isLead })),
  };
}
