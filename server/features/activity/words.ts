import type { ActivityCode } from '#shared/caregivers/activity-codes.ts';

type Shown = {
  code: ActivityCode;
  /** Only the patient's side does it: then whoever did it acted for the patient, also where they are staff. */
  side?: 'patient';
  /** It is about what was flagged: whoever covers for the care team does it without a reason of their own. */
  covers?: true;
};

/** Every act on a patient's record that the patient reads of, by the action of its audit entry. */
export const shownActions: Record<string, Shown> = {
  'patient.opened': { code: 'opened-record' },
  'chart.opened-outside-team': { code: 'gave-reason' },
  'patient.changed': { code: 'changed-record' },
  'patient.enrolled': { code: 'enrolled' },
  'patient.moved': { code: 'moved-state' },
  'patient.invited': { code: 'sent-invitation' },
  'invitation.letter-opened': { code: 'opened-letter' },
  'case.opened': { code: 'opened-case', covers: true },
  'flag.seen': { code: 'saw-flag', covers: true },
  'flag.claimed': { code: 'claimed-flag', covers: true },
  'flag.released': { code: 'released-flag', covers: true },
  'flag.closed': { code: 'closed-flag', covers: true },
  'flag.replied': { code: 'answered-flag', covers: true },
  'flag.raised': { code: 'raised-flag' },
  'today.read': { code: 'read-today', side: 'patient' },
  'plan.read': { code: 'read-plan', side: 'patient' },
  'check-in.context-read': { code: 'began-check-in', side: 'patient' },
  'check-in.sent': { code: 'sent-check-in', side: 'patient' },
  'alert.sent': { code: 'sent-alert', side: 'patient' },
  'alert.called-a-mistake': { code: 'called-alert-mistake', side: 'patient' },
  'thread.opened': { code: 'opened-thread', covers: true },
  'thread.message-posted': { code: 'wrote-message', covers: true },
  'thread.seen': { code: 'saw-messages', covers: true },
  'thread.closed': { code: 'closed-thread', covers: true },
  'caregiver.invited': { code: 'let-caregiver-in' },
  'caregiver.changed': { code: 'changed-caregiver', side: 'patient' },
  'caregiver.ended': { code: 'ended-caregiver' },
};

/** What somebody did for a patient can have been done as a caregiver only. */
export const patientSideActions = Object.keys(shownActions).filter(
  (action) => shownActions[action]?.side === 'patient',
);

/** Acts on a patient's record that the patient does not read of, with the reason. */
export const notShown: Record<string, string> = {
  'flag.added-to': 'The flag itself is told of; that it grew is on the clinic’s screens.',
  'caregivers.listed': 'The patient’s own look at the own list.',
  'activity.listed': 'The patient’s own look at this list.',
};
