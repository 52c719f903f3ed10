import { z } from 'zod';

/** Where the queue keeps its tables; made by the owner's migration. */
export const queueSchema = 'jobs';

const clinicJob = { clinicId: z.uuid() };

/**
 * Every kind of job with its payload: ids only, since the queue's tables have no row security.
 * A lease that runs out makes the job run again, so each task is safe to run twice.
 */
export const jobPayloads = {
  'evaluate-check-in': z.strictObject({ ...clinicJob, checkInId: z.uuid() }),
  'evaluate-alert': z.strictObject({ ...clinicJob, alertId: z.uuid() }),
  'send-notification': z.strictObject({ ...clinicJob, notificationId: z.uuid() }),
} as const;

export type JobName = keyof typeof jobPayloads;
export type JobPayload<Name extends JobName> = z.output<(typeof jobPayloads)[Name]>;

/** Lease, retries and backoff of each queue. Delays are in seconds. */
export const queueOptions: Record<
  JobName,
  { expireInSeconds: number; retryLimit: number; retryDelay: number }
> = {
  'evaluate-check-in': { expireInSeconds: 15, retryLimit: 20, retryDelay: 1 },
  'evaluate-alert': { expireInSeconds: 15, retryLimit: 20, retryDelay: 1 },
  'send-notification': { expireInSeconds: 30, retryLimit: 12, retryDelay: 2 },
};

/** The channel on which a transaction that adds a job wakes the workers; the payload is the queue's name. */
export const jobChannel = 'espalier_jobs';
