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
    clinic: z.object({ name: z.string(), phone: z.string(), emergencyNumber: z.string() }).nullable(),
    /** A clinic of invented people, whose mails and codes anybody on this machine may read. */
    demo: z.boolean(),
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
    /** Pages of this clinic that reached nobody in the last seven days, and whatever is over ten minutes late. */
    unsent: z.number().int(),
  }),
});
