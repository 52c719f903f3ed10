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

const everybody = roles;
const clinicians = ['therapist', 'on-call-clinician', 'clinical-lead'] as const;

/**
 * Roles × permissions on one screen. A permission opens a kind of act; which rows it opens is decided
 * by the door of that row. A caregiver acts on the record of the patient who let them in, within limits.
 */
const grants = {
  'session:own': everybody,
  'account:own': everybody,
  'today:read': ['patient', 'caregiver'],
  'check-in:write': ['patient', 'caregiver'],
  'caregiver:manage': ['patient'],
  'activity:read': ['patient'],
  'flag:read': clinicians,
  'flag:work': clinicians,
  'thread:read': ['patient', 'caregiver', ...clinicians],
  'thread:write': ['patient', 'caregiver', ...clinicians],
  'thread:close': clinicians,
  'patient:list': [...clinicians, 'administrator'],
  'patient:invite': [...clinicians, 'administrator'],
  'patient:read': clinicians,
  'patient:write': clinicians,
  'person:manage': ['administrator'],
  'two-person:decide': ['clinical-lead', 'administrator'],
  'delivery:manage': ['administrator'],
  'worker:read': [...clinicians, 'administrator', 'billing'],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof grants;

export const permissions = Object.keys(grants) as Permission[];

export const may = (held: readonly Role[], permission: Permission): boolean => {
  const allowed: readonly Role[] = grants[permission];
  return held.some((role) => allowed.includes(role));
};

/** Clinicians cover the clinic's queue; the rest of the staff sees no answers. */
export const clinicianRoles = clinicians satisfies readonly Role[];

export const isClinician = (held: readonly Role[]): boolean =>
  held.some((role) => (clinicianRoles as readonly Role[]).includes(role));

/** Works for the clinic: has a second factor, and a session that ends after 15 idle minutes. */
export const isStaff = (held: readonly Role[]): boolean =>
  held.some((role) => role !== 'patient' && role !== 'caregiver');

/** Clinicians who answer for the whole clinic, and so read threads outside their own care teams. */
export const coversClinic = (held: readonly Role[]): boolean =>
  held.includes('on-call-clinician') || held.includes('clinical-lead');
