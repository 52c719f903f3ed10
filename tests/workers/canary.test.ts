import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { hintChannel } from '#server/realtime/announce.ts';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import {
  signInAt,
  startWebProcess,
  startWorkerProcess,
  type ProcessBrowser,
  type RealProcess,
} from '../faults/processes.ts';
import { alertBody, checkInBody } from '../server/check-ins/bodies.ts';
import { fillForms, formCanaries, keptInAudit } from './canary-forms.ts';
import { startMailServer, type MailServer } from './mail-server.ts';

/** Words that stand nowhere else, in a name, a note, messages, a subject, an outcome and every field of the forms. */
const canaries = ['Zebedee', 'Quillfeather', 'ferret', 'crocodile', 'marzipan', 'bassoon', ...formCanaries];
const patientName = 'Zebedee Quillfeather';
const note = 'My ferret tripped me on the stairs.\n    at ferret (stairs.js:1:1)';
const text = 'The crocodile ate my sling.\n    at crocodile (sling.js:1:1)';
const subject = 'About the marzipan';
const outcomeNote = 'Spoke to the bassoon player.';

let database: TestDatabase;
let mailServer: MailServer;
let web: Awaited<ReturnType<typeof startWebProcess>> | undefined;
let worker: RealProcess | undefined;
let listening: pg.Client;
const hintPayloads: string[] = [];
const problemBodies: string[] = [];
const statuses: number[] = [];

/** Calls and keeps what was refused, since a refusal may be shown, logged or reported anywhere. */
const calling =
  ({ call }: ProcessBrowser): ProcessBrowser['call'] =>
  async (...request) => {
    const answer = await call(...request);
    statuses.push(answer.status);
    if (answer.status >= 400) problemBodies.push(answer.text);
    return answer;
  };

/** Makes every insert into a table fail with the whole row in the database's own message. */
const failInserts = async (table: string, whileFailing: () => Promise<void>) => {
  await database.asSuperuser.query(
    `create or replace function tell_all() returns trigger language plpgsql as $$
       begin raise exception 'cannot keep %', new using detail = new::text; end $$;
     create trigger tell_all before insert on ${table} for each row execute function tell_all()`,
  );
  await whileFailing();
  await database.asSuperuser.query(`drop trigger tell_all on ${table}`);
};

const until = (holds: () => Promise<void>) => vi.waitFor(holds, { timeout: 20_000, interval: 50 });
const countOf = async (query: string) => (await database.asSuperuser.query(query)).rowCount;

beforeAll(async () => {
  database = await cloneDatabase();
  await database.asSuperuser.query('update jobs.queue set retry_delay = 0, retry_backoff = false');
  mailServer = await startMailServer();
  listening = new pg.Client({ connectionString: database.urls.app });
  await listening.connect();
  listening.on('notification', ({ payload }) => hintPayloads.push(payload ?? ''));
  await listening.query(`listen ${hintChannel}`);
  const clinicId = await makeClinic(database);
  const lead = await makePerson(database, clinicId, ['therapist', 'on-call-clinician']);
  const patient = await makePatient(database, clinicId, { lead, name: patientName });
  const administrator = await makePerson(database, clinicId, ['administrator']);
  const stranger = await makePatient(database, clinicId);
  // One after the other, so that the web is stopped also when the worker does not start.
  web = await startWebProcess(database);
  const served = web;
  worker = await startWorkerProcess(database, mailServer.url);
  const phone = calling(await signInAt(served.url, patient));
  const desk = calling(await signInAt(served.url, lead));
  const office = calling(await signInAt(served.url, administrator));
  // The second factor and the fresh proof have tests of their own; here they were given.
  await database.asSuperuser.query(
    `update signed_in_sessions set second_factor = 'authenticator', proven_at = now()`,
  );
  await fillForms({ desk, office, phone, lead, strangerId: stranger.patientId });

  // What goes well.
  const checkIn = checkInBody({ answers: { symptoms: ['changed-shape'], painNow: 8, note } });
  await phone(
    'post',
    '/api/alerts',
    alertBody({ checkInId: checkIn.id, answers: { danger: ['bleeding'], note } }),
  );
  await phone('post', '/api/check-ins', checkIn);
  await until(async () => expect(await countOf('select from flags')).toBe(1));
  const { rows } = await database.asSuperuser.query<{ id: string }>('select id from flags');
  const flag = `/api/flags/${rows[0]!.id}`;
  await desk('get', flag);
  await desk('post', `${flag}/replies`, { id: randomUUID(), text });
  const started = await phone('post', '/api/threads', {
    id: randomUUID(),
    subject,
    message: { id: randomUUID(), text },
  });
  const thread = `/api/threads/${(JSON.parse(started.text) as { id: string }).id}`;
  const message = { id: randomUUID(), text };
  await phone('post', `${thread}/messages`, message);

  // What is refused.
  await phone('post', '/api/check-ins', { ...checkIn, answers: { note: `${note} otherwise` } });
  await phone('post', '/api/check-ins', { ...checkInBody(), answers: { note, painNow: note } });
  await phone('post', '/api/check-ins', {
    ...checkInBody(),
    answers: { symptoms: [note], note: 'ferret'.repeat(800) },
  });
  await phone('post', '/api/check-ins', `{"answers": {"note": "ferret`);
  await phone('post', `${thread}/messages`, { ...message, text: `${text} otherwise` });
  await phone('post', `${thread}/messages`, { id: randomUUID(), text: `${text}\u0000` });
  await phone('get', `/api/alerts/${encodeURIComponent(patientName)}`);
  await phone('get', '/api/patients/Zebedee?note=ferret');
  await desk('post', `${flag}/close`, { outcome: 'forgotten', worthRaising: 'yes', note: outcomeNote });

  // What fails: in the web, in the worker's evaluation and at the mail server.
  await failInserts('messages', async () => {
    await phone('post', `${thread}/messages`, { id: randomUUID(), text });
  });
  await failInserts('check_ins', async () => {
    await phone('post', '/api/check-ins', checkInBody({ answers: { note } }));
  });
  await failInserts('flags', async () => {
    mailServer.refuse(true);
    await phone('post', '/api/check-ins', checkInBody({ answers: { symptoms: ['fall'], note } }));
    await until(async () => expect(worker?.lines.some((line) => line.includes('a job failed'))).toBe(true));
  });
  await desk('post', `${flag}/close`, { outcome: 'no-action-needed', worthRaising: 'no', note: outcomeNote });
  await until(async () => expect(await countOf('select from flags')).toBe(2));
  await until(async () =>
    expect(await countOf('select from notifications where last_error is not null')).toBeGreaterThan(0),
  );
  mailServer.refuse(false);
  // Failed tries come again after their pauses, as for everybody; nobody waits here for the long ones.
  await database.asSuperuser.query(`update notifications set due_at = now() where state = 'pending'`);
  await until(async () => expect(await countOf(`select from notifications where state = 'pending'`)).toBe(0));
}, 120_000);

afterAll(async () => {
  await Promise.all([web?.stop(), worker?.stop()]);
  await listening.end();
  await mailServer.stop();
  await database.drop();
});

const rowsOf = async (table: string): Promise<string[]> => {
  const { rows } = await database.asSuperuser.query<{ row: string }>(`select t::text as row from ${table} t`);
  return rows.map(({ row }) => row);
};

describe("a made-up patient's name, note, messages, subject and outcome", () => {
  it('went through the product, so that there was something to leak', async () => {
    const kept = [
      ...(await rowsOf('people')),
      ...(await rowsOf('check_ins')),
      ...(await rowsOf('messages')),
      ...(await rowsOf('threads')),
      ...(await rowsOf('flag_events')),
      ...(await rowsOf('patients')),
      ...(await rowsOf('operation_cards')),
      ...(await rowsOf('caregivers')),
      ...(await rowsOf('patient_state_changes')),
      ...(await rowsOf('chart_openings')),
      ...(await rowsOf('two_person_acts')),
    ].join('\n');
    for (const canary of canaries) expect(kept).toContain(canary);
    expect(new Set(statuses)).toEqual(new Set([200, 201, 204, 400, 403, 404, 409, 422, 500]));
  });

  it.each<[where: string, what: () => Promise<string[]> | string[], but?: string[]]>([
    ['a mail, sent or refused', () => mailServer.raw],
    ['a job', () => rowsOf('jobs.job')],
    ['a notification', () => rowsOf('notifications')],
    ['an audit entry', () => rowsOf('audit_entries'), keptInAudit],
    ["the web's log", () => web?.lines ?? []],
    ["the worker's log", () => worker?.lines ?? []],
    ['a hint on its way to the webs', () => hintPayloads],
    ['the body of a problem', () => problemBodies],
  ])('are not in %s', async (_where, what, but = []) => {
    const all = await what();
    expect(all.length).toBeGreaterThan(0);
    for (const one of all) {
      for (const canary of canaries.filter((word) => !but.includes(word))) {
        expect(one.toLowerCase()).not.toContain(canary.toLowerCase());
      }
    }
  });

  it('are in no mail in any encoding: each says only what its kind says', () => {
    const subjects = new Set(mailServer.mails.map((mail) => mail.subject));
    expect([...subjects].sort()).toEqual([
      'Espalier: a flag is waiting',
      'Espalier: a message is waiting',
      'Espalier: an emergency flag is waiting',
      'Espalier: an urgent flag is waiting',
      'Espalier: you are invited',
      'Espalier: your clinic has closed your record',
    ]);
    for (const mail of mailServer.mails) {
      const words = [mail.subject, mail.text, mail.html ?? ''].join(' ').toLowerCase();
      for (const word of [...canaries, 'fall', 'pain', 'bleed', 'shape', 'shoulder', 'surgery']) {
        expect(words).not.toContain(word.toLowerCase());
      }
    }
  });
});
