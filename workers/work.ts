import { randomUUID } from 'node:crypto';
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import { listenTo } from '#server/db/listener.ts';
import { beat, heartbeatEveryMs } from '#server/features/clinic/worker-health.ts';
import { jobChannel, jobPayloads, queueSchema, type JobName, type JobPayload } from '#server/jobs/queues.ts';
import type { DeliveryTools } from '#server/notifications/delivery.ts';
import { createSender, type Sender } from '#server/notifications/sender.ts';
import { evaluateAlertTask } from './tasks/evaluate-alert.ts';
import { evaluateCheckInTask } from './tasks/evaluate-check-in.ts';
import { sendNotificationTask } from './tasks/send-notification.ts';
import { startTimedWork } from './timed.ts';

type Task<Name extends JobName> = (payload: JobPayload<Name>) => Promise<void>;
type Tasks = { [Name in JobName]: Task<Name> };

export type WorkOptions = {
  databaseUrl: string;
  tools: DeliveryTools;
  clock: () => Date;
  log: Logger;
  /** How many notifications may be on their way at once. */
  sendAtOnce?: number;
};

const tasksOf = ({ tools: { pools }, clock }: WorkOptions, sender: Sender): Tasks => ({
  'evaluate-check-in': (payload) => evaluateCheckInTask(pools, payload, clock()),
  'evaluate-alert': (payload) => evaluateAlertTask(pools, payload, clock()),
  'send-notification': () => sendNotificationTask(sender),
});

/**
 * A job starts when its transaction commits and not at the next poll. After a break every queue is looked at, for
 * what was committed in between woke nobody.
 */
const wakeOnNewJobs = (databaseUrl: string, wake: (name: string) => void, log: Logger) =>
  listenTo(
    { databaseUrl, channel: jobChannel, name: 'espalier-jobs' },
    { onPayload: wake, onGap: () => Object.keys(jobPayloads).forEach(wake) },
    log,
  );

/** Takes jobs until it is stopped, and gives a sign of life every few seconds. */
export const startWork = async (options: WorkOptions): Promise<{ stop: () => Promise<void> }> => {
  const { databaseUrl, tools, clock, log, sendAtOnce } = options;
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

  const sender = createSender(tools, { clock, log, ...(sendAtOnce ? { atOnce: sendAtOnce } : {}) });
  const tasks = tasksOf(options, sender);
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
            await tasks[name](payload);
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

  const waker = wakeOnNewJobs(databaseUrl, wakeUp, log);
  await waker.ready;
  const timed = startTimedWork(tools, { sender, clock, log });

  const workerId = randomUUID();
  const giveSign = () =>
    beat(tools.pools.gate, workerId, clock()).catch((error: unknown) =>
      log.error({ err: error }, 'no sign of life could be given'),
    );
  await giveSign();
  const heartbeat = setInterval(() => void giveSign(), heartbeatEveryMs);

  return {
    stop: async () => {
      clearInterval(heartbeat);
      await timed.stop();
      await waker.stop();
      await boss.stop({ graceful: true, wait: true, timeout: 10_000 });
      await sender.stop();
    },
  };
};
