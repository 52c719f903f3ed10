import type { ClinicCard } from '#shared/clinic/contract.ts';

/** Whether nobody watches now. The card may be older than the opening hour that it names. */
export const isClosed = ({ openNow, opensAt }: ClinicCard, nowMs: number): boolean =>
  !openNow && (opensAt === null || Date.parse(opensAt) > nowMs);
