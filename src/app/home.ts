import { isClinician } from '#shared/access/permissions.ts';
import type { Role } from '#shared/access/permissions.ts';

/** The first screen of a person, by what their roles are for. */
export function homeOf(roles: readonly Role[]): string {
  if (roles.includes('patient')) return '/today';
  if (isClinician(roles)) return '/round';
  // Where it is not clear for whom, Today itself leads to the question.
  if (roles.includes('caregiver')) return '/today';
  if (roles.includes('administrator')) return '/clinic/people';
  return '/no-screens';
}

/** A place inside this application that a person was on their way to; anything else is refused. */
export function safePlace(place: string | null): string | null {
  return place !== null && /^\/(?![/\\])/.test(place) && !place.startsWith('/sign-in') ? place : null;
}
