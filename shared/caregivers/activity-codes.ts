/** What somebody did with a patient's record, as the patient reads it; the words stand in the patients' files. */
export const activityCodes = [
  'opened-record',
  'gave-reason',
  'changed-record',
  'enrolled',
  'moved-state',
  'sent-invitation',
  'opened-letter',
  'opened-case',
  'saw-flag',
  'claimed-flag',
  'released-flag',
  'closed-flag',
  'answered-flag',
  'raised-flag',
  'read-today',
  'read-plan',
  'began-check-in',
  'sent-check-in',
  'sent-alert',
  'called-alert-mistake',
  'opened-thread',
  'wrote-message',
  'saw-messages',
  'closed-thread',
  'let-caregiver-in',
  'changed-caregiver',
  'ended-caregiver',
] as const;
export type ActivityCode = (typeof activityCodes)[number];

/** A reason that is no person's own words: somebody who covers for the care team. */
export const coveringReason = 'covering';
