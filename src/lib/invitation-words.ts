import type { InvitationCard } from '#shared/people/contract.ts';
import { formatDate, localDateOf } from './format.ts';

type Coming = {
  invitation: InvitationCard | null;
  firstSignedInAt: string | null;
  /** Patients only: null until the first check-in arrived. */
  firstCheckInAt?: string | null;
};

/** How far somebody has come on the way in, in a few words; null once there is nothing to say. */
export function comingWords(coming: Coming, nowMs: number, timeZone: string): string | null {
  const { invitation, firstSignedInAt, firstCheckInAt } = coming;
  const dateOf = (instant: string) => formatDate(localDateOf(instant, timeZone));
  if (firstSignedInAt !== null) return firstCheckInAt === null ? 'Signed in, no check-in yet' : null;
  if (!invitation) return 'Not invited yet';
  const { state, createdAt, expiresAt, askedAgainAt } = invitation;
  if (askedAgainAt !== null) return `Asked for a new invitation ${dateOf(askedAgainAt)}`;
  if (state === 'accepted') return 'Has set up a way in';
  if (state === 'revoked') return 'Invitation withdrawn';
  if (state === 'expired' || Date.parse(expiresAt) <= nowMs) return `Invitation ran out ${dateOf(expiresAt)}`;
  return `Invited ${dateOf(createdAt)}, not come yet`;
}

/** Whether the letter of an invitation still opens something. */
export const isOpenInvitation = (
  invitation: InvitationCard | null,
  nowMs: number,
): invitation is InvitationCard => invitation?.state === 'open' && Date.parse(invitation.expiresAt) > nowMs;
