import { z } from 'zod';
import { contract } from '../http/contract.ts';

/** What every signed-in screen needs of the clinic. Times are instants; the zone is the clinic's. */
export const clinicCard = z.object({
  id: z.uuid(),
  name: z.string(),
  timeZone: z.string(),
  emergencyNumber: z.string(),
  crisisNumber: z.string(),
  onCallNumber: z.string(),
  phone: z.string(),
  openNow: z.boolean(),
  opensAt: z.iso.datetime().nullable(),
});

export type ClinicCard = z.output<typeof clinicCard>;

export const getSignInPage = contract({
  method: 'get',
  path: '/api/sign-in-page',
  summary: 'What the sign-in page shows of the clinic, where this server holds just one.',
  status: 200,
  output: z.object({
    clinic: z.object({ name: z.string(), emergencyNumber: z.string() }).nullable(),
  }),
});

export const getWorkerHealth = contract({
  method: 'get',
  path: '/api/worker',
  summary: 'Whether the worker that evaluates check-ins is alive.',
  status: 200,
  output: z.object({
    lastBeatAt: z.iso.datetime().nullable(),
    /** No sign of life for 30 seconds. */
    late: z.boolean(),
    /** Check-ins and alerts of this clinic that no rule has seen for over 30 seconds. */
    unevaluated: z.number().int(),
    /** Mails of this clinic that failed for good, or that wait for over ten minutes. */
    unsent: z.number().int(),
  }),
});
