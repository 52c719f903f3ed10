/** Whom an invitation brings in. */
export const invitationKinds = ['patient', 'caregiver', 'staff'] as const;
export type InvitationKind = (typeof invitationKinds)[number];

const hourMs = 60 * 60 * 1000;

/** How long an invitation can be used: to day 14 for patients and their caregivers, 72 hours for staff. */
export const invitationLifeMs: Record<InvitationKind, number> = {
  patient: 14 * 24 * hourMs,
  caregiver: 14 * 24 * hourMs,
  staff: 72 * hourMs,
};

/** What has become of the newest invitation of somebody. */
export const invitationStates = ['open', 'accepted', 'expired', 'revoked'] as const;
export type InvitationState = (typeof invitationStates)[number];
