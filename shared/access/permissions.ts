/** The roles of a clinic. One person may hold several; what they may do is the union. */
export const roles = [
  'patient',
  'caregiver',
  'therapist',
  'on-call-clinician',
  'clinical-lead',
  'administrator',
  'billing',
] as const;

export type Role = (typeof roles)[number];

/**
 * Roles × permissions on one screen. A permission opens a kind of act; which rows it opens is decided
 * by the door of that row. A caregiver's, an administrator's and billing's acts come with their screens.
 */
const grants = {
  'session:own': [
    'patient',
    'caregiver',
    'therapist',
    'on-call-clinician',
    'clinical-lead',
    'administrator',
    'billing',
  ],
  'today:read': ['patient'],
  'check-in:write': ['patient'],
  'flag:read': ['therapist', 'on-call-clinician', 'clinical-lead'],
  'flag:work': ['therapist', 'on-call-clinician', 'clinical-lead'],
  'thread:read': ['patient', 'therapist', 'on-call-clinician', 'clinical-lead'],
  'thread:write': ['patient', 'therapist', 'on-call-clinician', 'clinical-lead'],
  'thread:close': ['therapist', 'on-call-clinician', 'clinical-lead'],
  'worker:read': ['therapist', 'on-call-clinician', 'clinical-lead', 'administrator', 'billing'],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof grants;

export const permissions = Object.keys(grants) as Permission[];

export const may = (held: readonly Role[], permission: Permission): boolean => {
  const allowed: readonly Role[] = grants[permission];
  return held.some((role) => allowed.includes(role));
};

/** Clinicians cover the clinic's queue; the rest of the staff sees no answers. */
export const clinicianRoles = [
  'therapist',
  'on-call-clinician',
  'clinical-lead',
] as const satisfies readonly Role[];

export const isClinician = (held: readonly Role[]): boolean =>
  held.some((role) => (clinicianRoles as readonly Role[]).includes(role));

/** Clinicians who answer for the whole clinic, and so read threads outside their own care teams. */
export const coversClinic = (held: readonly Role[]): boolean =>
  held.includes('on-call-clinician') || held.includes('clinical-lead');
