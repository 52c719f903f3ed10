import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { alertBody, checkInBody } from '../server/check-ins/bodies.ts';
import { startMailServer, type MailServer } from '../workers/mail-server.ts';
import {
  signInAt,
  startWebProcess,
  startWorkerProcess,
  type ProcessBrowser,
  type RealProcess,
} from './processes.ts';

let database: TestDatabase;
let mailServer: MailServer;
let lead: TestPerson;
let patient: TestPatient;
let web: Awaited<ReturnType<typeof startWebProcess>>;
let phone: ProcessBrowser;
const processes: RealProcess[] = [];

beforeAll(async () => {
  database = await cloneDatabase();
  mailServer = await startMailServer();
});

afterAll(async () => {
  await mailServer.stop();
  await database.drop();
});

beforeEach(async () => {
  const clinicId = await makeClinic(database);
  lead = await makePerson(database, clinicId, ['therapist']);
  patient = await makePatient(database, clinicId, { lead });
  web = await startWebProcess(database);
  processes.push(web);
  phone = await signInAt(web.url, patient);
});

afterEach(async () => {
  await Promise.all(processes.splice(0).map((one) => one.stop()));
});

const startWorker = async () => {
  const worker = await startWorkerProcess(database, mailServer.url);
  processes.push(worker);
  return worker;
};
const urgent = { symptoms: ['changed-shape' as const] };

const outcome = async () => {
  const { rows } = await database.asSuperuser.query<Record<string, number>>(
    `select count(*)::int as flags,
       coalesce(sum((select count(*) from flag_events e where e.flag_id = f.id and e.kind = 'raised')), 0)::int as raised,
       coalesce(sum((select count(*) from notifications n where n.occasion like 'flag:' || f.id || ':%')), 0)::int as told
     from flags f where f.patient_id = $1`,
    [patient.patientId],
  );
  return rows[0];
};
const once = { flags: 1, raised: 1, told: 1 };

/** Waits until something is true, for no longer than the promise that is tested. */
const until = (timeout: number, holds: () => Promise<void>) => vi.waitFor(holds, { timeout, interval: 100 });

describe('kill -9 of the worker between the commit of a check-in and its evaluation', () => {
  it('leaves one flag within 15 s with no worker at all, and still one after the worker is back', async () => {
    const worker = await startWorker();
    // The evaluation gets as far as raising the flag and no further.
    const gate = await database.asSuperuser.connect();
    await gate.query('begin');
    await gate.query('lock table flags in share mode');
    expect((await phone.call('post', '/api/check-ins', checkInBody({ answers: urgent }))).status).toBe(201);
    const committedAt = performance.now();
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
    expect(await outcome()).toMatchObject({ flags: 0 });

    await until(15_000 - (performance.now() - committedAt), async () =>
      expect(await outcome()).toEqual(once),
    );

    // The job that the worker died with comes back when its lease is over; here that is now.
    await database.asSuperuser.query(
      `update jobs.job set state = 'retry', start_after = now() where name = 'evaluate-check-in' and state = 'active'`,
    );
    await startWorker();
    await until(15_000, async () => {
      const { rows } = await database.asSuperuser.query(
        `select distinct state::text from jobs.job where name in ('evaluate-check-in', 'send-notification')`,
      );
      expect(rows).toEqual([{ state: 'completed' }]);
    });
    expect(await outcome()).toEqual(once);
    expect(mailServer.mails.filter(({ to }) => to.includes(lead.email))).toHaveLength(1);
  }, 60_000);

  it('leaves one flag from the alert at the tick in the same way', async () => {
    expect((await phone.call('post', '/api/alerts', alertBody({ answers: urgent }))).status).toBe(201);
    await until(15_000, async () => expect(await outcome()).toEqual(once));
  }, 60_000);
});

describe('kill -9 of the web right after its answer', () => {
  it('loses nothing: the check-in is there, and is one flag', async () => {
    const body = checkInBody({ answers: urgent });
    const answer = await phone.call('post', '/api/check-ins', body);
    await web.kill9();
    expect(answer.status).toBe(201);
    const { rowCount } = await database.asSuperuser.query('select from check_ins where client_id = $1', [
      body.id,
    ]);
    expect(rowCount).toBe(1);

    await startWorker();
    await until(15_000, async () => expect(await outcome()).toEqual(once));

    // The phone never heard the answer and sends again, to a web that is new.
    web = await startWebProcess(database);
    processes.push(web);
    phone = await signInAt(web.url, patient);
    const again = await phone.call('post', '/api/check-ins', body);
    expect([again.status, again.text]).toEqual([201, answer.text]);
    expect(await outcome()).toEqual(once);
  }, 60_000);
});

describe('an orderly end', () => {
  it('is code 0 for web and worker, also with a job under way', async () => {
    const worker = await startWorker();
    expect((await phone.call('post', '/api/check-ins', checkInBody({ answers: urgent }))).status).toBe(201);
    processes.splice(0);
    expect(await Promise.all([web.stop(), worker.stop()])).toEqual([0, 0]);
  }, 60_000);
});
