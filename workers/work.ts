import { randomUUID } from 'node:crypto';
import pg from 'pg';
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { Pools } from '#server/db/pools.ts';
import { beat, heartbeatEveryMs } from '#server/features/clinic/worker-health.ts';
import {
  jobChannel,
  jobPayloads,
  queueOptions,
  queueSchema,
  type JobName,
  type JobPayload,
} from '#server/jobs/queues.ts';
import type { Mailer } from '#server/notifications/mailer.ts';
import { evaluateAlertTask } from './tasks/evaluate-alert.ts';
import { evaluateCheckInTask } from './tasks/evaluate-check-in.ts';
import { sendNotificationTask } from './tasks/send-notification.ts';

type Task<Name extends JobName> = (payload: JobPayload<Name>, isLastTry: boolean) => Promise<void>;
type Tasks = { [Name in JobName]: Task<Name> };

export type WorkOptions = {
  databaseUrl: string;
  pools: Pools;
  mailer: Mailer;
  clock: () => Date;
  log: Logger;
};

const tasksOf = ({ pools, mailer, clock }: WorkOptions): Tasks => ({
  'evaluate-check-in': (payload) => evaluateCheckInTask(pools, payload, clock()),
  'evaluate-alert': (payload) => evaluateAlertTask(pools, payload, clock()),
  'send-notification': (payload, isLastTry) =>
    sendNotificationTask(pools, mailer, payload, { now: clock(), isLastTry }),
});

/** Listens on a connection of its own, so that a job starts when its transaction commits and not at the next poll. */
const wakeOnNewJobs = async (databaseUrl: string, wake: (name: string) => void, log: Logger) => {
  const client = new pg.Client({
    connectionString: databaseUrl,
    application_name: 'espalier-jobs',
    keepAlive: true,
  });
  // Without the nudge jobs still start, at the queue's own polling interval.
  client.on('error', (error) => log.warn({ err: error }, 'the connection that wakes the worker broke'));
  client.on('notification', ({ payload }) => {
    if (payload) wake(payload);
  });
  await client.connect();
  await client.query(`listen ${jobChannel}`);
  return client;
};

/** Takes jobs until it is stopped, and gives a sign of life every few seconds. */
export const startWork = async (options: WorkOptions): Promise<{ stop: () => Promise<void> }> => {
  const { databaseUrl, pools, clock, log } = options;
  const boss = new PgBoss({
    connectionString: databaseUrl,
    schema: queueSchema,
    migrate: false,
    schedule: false,
    max: 4,
    application_name: 'espalier-queue',
  });
  boss.on('error', (error) => log.error({ err: error }, 'the queue reported an error'));
  await boss.start();

  const tasks = tasksOf(options);
  const workerIds = new Map<string, string>();
  const wakeUp = (name: string): void => {
    const id = workerIds.get(name);
    if (id) boss.notifyWorker(id);
  };
  const take = async <Name extends JobName>(name: Name): Promise<void> => {
    const schema = jobPayloads[name];
    const id = await boss.work<JobPayload<Name>>(
      name,
      { includeMetadata: true, batchSize: 1, pollingIntervalSeconds: 1 },
      async (jobs) => {
        // Work was found, so there may be more: look again at once rather than at the next poll.
        wakeUp(name);
        for (const job of jobs) {
          try {
            const payload = schema.parse(job.data) as JobPayload<Name>;
            await tasks[name](payload, job.retryCount >= queueOptions[name].retryLimit);
          } catch (error) {
            log.error({ err: error, job: job.id, queue: name, retry: job.retryCount }, 'a job failed');
            throw new Error('The job failed; the log says why.');
          }
        }
      },
    );
    workerIds.set(name, id);
  };
  for (const name of Object.keys(jobPayloads) as JobName[]) await take(name);

  const waker = await wakeOnNewJobs(databaseUrl, wakeUp, log);

  const workerId = randomUUID();
  const giveSign = () =>
    beat(pools.gate, workerId, clock()).catch((error: unknown) =>
      log.error({ err: error }, 'no sign of life could be given'),
    );
  await giveSign();
  const heartbeat = setInterval(() => void giveSign(), heartbeatEveryMs);

  return {
    stop: async () => {
      clearInterval(heartbeat);
      await waker.end();
      await boss.stop({ graceful: true, wait: true, timeout: 10_000 });
    },
  };
};
