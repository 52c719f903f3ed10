import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { makeClinic, makePatient, makePerson, type TestPatient } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { alertBody, checkInBody } from '../server/check-ins/bodies.ts';
import { startMailServer, type MailServer } from '../workers/mail-server.ts';
import { signInAt, startWebProcess, startWorkerProcess, type RealProcess } from './processes.ts';

const startWithinMs = 60_000;

let database: TestDatabase;
let mailServer: MailServer;
let checkingIn: TestPatient;
let alerting: TestPatient;
let web: Awaited<ReturnType<typeof startWebProcess>>;
let worker: RealProcess;

beforeAll(async () => {
  database = await cloneDatabase();
  mailServer = await startMailServer();
  const clinicId = await makeClinic(database);
  const lead = await makePerson(database, clinicId, ['therapist']);
  checkingIn = await makePatient(database, clinicId, { lead });
  alerting = await makePatient(database, clinicId, { lead });
  [web, worker] = await Promise.all([
    startWebProcess(database),
    startWorkerProcess(database, mailServer.url),
  ]);
});

afterAll(async () => {
  await Promise.all([web.stop(), worker.stop()]);
  await mailServer.stop();
  await database.drop();
});

const urgent = { symptoms: ['changed-shape' as const] };

const outcomeFor = async ({ patientId }: TestPatient) => {
  const { rows } = await database.asSuperuser.query<Record<string, number>>(
    `select count(*)::int as flags,
       coalesce(sum((select count(*) from flag_events e where e.flag_id = f.id and e.kind = 'raised')), 0)::int as raised,
       coalesce(sum((select count(*) from notifications n where n.occasion like 'flag:' || f.id || ':%')), 0)::int as told
     from flags f where f.patient_id = $1`,
    [patientId],
  );
  return rows[0];
};
const once = { flags: 1, raised: 1, told: 1 };

/** Waits until something is true, for no longer than the promise that is tested. */
const until = (timeout: number, holds: () => Promise<void>) => vi.waitFor(holds, { timeout, interval: 100 });
const jobsDone = async () => {
  const { rows } = await database.asSuperuser.query(
    `select distinct state::text from jobs.job
     where name in ('evaluate-check-in', 'evaluate-alert', 'send-notification')`,
  );
  expect(rows).toEqual([{ state: 'completed' }]);
};
/** The job only wakes the sender; what it owes stands in the rows. */
const allSent = async () => {
  const { rows } = await database.asSuperuser.query('select distinct state from notifications');
  expect(rows).toEqual([{ state: 'sent' }]);
};

// One story in the order in which it happens: each part goes on where the one before has ended.
describe('kill -9 of the worker between a commit and its evaluation', () => {
  it(
    'leaves one flag of a check-in, and one of an alert, within 15 s with no worker at all',
    async () => {
      const [phone, otherPhone] = [await signInAt(web.url, checkingIn), await signInAt(web.url, alerting)];
      // The evaluation gets as far as raising the flag and no further.
      const gate = await database.asSuperuser.connect();
      await gate.query('begin');
      await gate.query('lock table flags in share mode');
      const sent = await phone.call('post', '/api/check-ins', checkInBody({ answers: urgent }));
      const committedAt = performance.now();
      expect(sent.status).toBe(201);
      await until(5000, async () => {
        const { rowCount } = await database.asSuperuser.query(
          `select from pg_stat_activity where datname = current_database() and wait_event_type = 'Lock'
           and query like 'insert into "flags"%'`,
        );
        expect(rowCount).toBe(1);
      });
      await worker.kill9();
      await gate.query('rollback');
      gate.release();
      const alerted = await otherPhone.call('post', '/api/alerts', alertBody({ answers: urgent }));
      const alertedAt = performance.now();
      expect(alerted.status).toBe(201);
      expect([await outcomeFor(checkingIn), await outcomeFor(alerting)]).toMatchObject([
        { flags: 0 },
        { flags: 0 },
      ]);

      await until(committedAt + 15_000 - performance.now(), async () =>
        expect(await outcomeFor(checkingIn)).toEqual(once),
      );
      await until(alertedAt + 15_000 - performance.now(), async () =>
        expect(await outcomeFor(alerting)).toEqual(once),
      );
      expect(mailServer.mails).toEqual([]);
    },
    startWithinMs,
  );

  it(
    'leaves still one after the worker is back, and mails of each once',
    async () => {
      // The job that the worker died with comes back when its lease is over; here that is now.
      const { rowCount } = await database.asSuperuser.query(
        `update jobs.job set state = 'retry', start_after = now() where name = 'evaluate-check-in' and state = 'active'`,
      );
      expect(rowCount).toBe(1);
      worker = await startWorkerProcess(database, mailServer.url);
      await until(15_000, jobsDone);
      await until(15_000, allSent);
      expect([await outcomeFor(checkingIn), await outcomeFor(alerting)]).toEqual([once, once]);
      expect(mailServer.mails).toHaveLength(2);
    },
    startWithinMs,
  );
});

describe('kill -9 of the web right after its answer', () => {
  it(
    'loses nothing: the check-in is one flag, and sent again to a new web the same success',
    async () => {
      const patient = await makePatient(database, checkingIn.clinicId, {
        lead: await makePerson(database, checkingIn.clinicId, ['therapist']),
      });
      const body = checkInBody({ answers: urgent });
      const phone = await signInAt(web.url, patient);
      const answer = await phone.call('post', '/api/check-ins', body);
      await web.kill9();
      expect(answer.status).toBe(201);
      await until(15_000, async () => expect(await outcomeFor(patient)).toEqual(once));

      web = await startWebProcess(database);
      const again = await (await signInAt(web.url, patient)).call('post', '/api/check-ins', body);
      expect([again.status, again.text]).toEqual([201, answer.text]);
      await until(15_000, jobsDone);
      expect(await outcomeFor(patient)).toEqual(once);
    },
    startWithinMs,
  );
});

describe('an orderly end', () => {
  it(
    'is code 0 for web and worker',
    async () => {
      expect(await Promise.all([web.stop(), worker.stop()])).toEqual([0, 0]);
    },
    startWithinMs,
  );
});
