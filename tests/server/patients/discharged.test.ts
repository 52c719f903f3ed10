import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { alertBody, checkInBody } from '../check-ins/bodies.ts';
import { plantThread } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;
let patient: TestPatient;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  desk = await web.signIn(noor);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  patient = await makePatient(database, clinicId, { lead: noor });
});

const move = (name: string, changes: Record<string, unknown> = {}, { patientId } = patient) =>
  desk.call('post', `/api/patients/${patientId}/moves`, {
    move: name,
    reason: 'Said on the phone.',
    ...changes,
  });

describe('a discharged patient', () => {
  let threadId: string;
  let phone: TestBrowser;
  const post = (who: TestBrowser) =>
    who.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'One more thing.' });

  beforeEach(async () => {
    ({ threadId } = await plantThread(database, patient));
    phone = await web.signIn(patient);
    expect((await move('discharge')).status).toBe(200);
  });

  it('is told once that the clinic no longer watches, and their threads are closed', async () => {
    const { rows } = await database.asSuperuser.query(
      `select distinct kind, path from notifications where person_id = $1`,
      [patient.personId],
    );
    expect(rows).toEqual([{ kind: 'watching-ended', path: '/today' }]);
    expect((await phone.call('get', `/api/threads/${threadId}`)).body).toMatchObject({ state: 'closed' });
  });

  it('writes nothing that nobody would read, and is told whom to call', async () => {
    const started = await phone.call('post', '/api/threads', {
      id: randomUUID(),
      subject: 'Washing',
      message: { id: randomUUID(), text: 'May I?' },
    });
    for (const answer of [await post(phone), started]) {
      expect(answer.status).toBe(409);
      expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:not-watched' });
      expect(answer.text).toContain('555-0100');
      expect(answer.text).toContain('911');
    }
    const { rows } = await database.asSuperuser.query('select 1 from threads where patient_id = $1', [
      patient.patientId,
    ]);
    expect(rows).toHaveLength(1);
  });

  it('gets no answer from staff before being taken back', async () => {
    const refused = await post(desk);
    expect(refused.body).toMatchObject({ type: 'urn:espalier:problem:not-watched' });
    expect(refused.text).toContain('Take the patient back first');
    await move('take-back');
    expect((await phone.call('get', `/api/threads/${threadId}`)).body).toMatchObject({ state: 'closed' });
    expect((await post(desk)).status).toBe(201);
  });

  it('loses no check-in and no alert: both are kept and evaluated', async () => {
    const alert = alertBody();
    expect((await phone.call('post', '/api/alerts', alert)).status).toBe(201);
    const sent = checkInBody({ answers: { danger: ['bleeding'] }, id: alert.checkInId });
    expect((await phone.call('post', '/api/check-ins', sent)).status).toBe(201);
    await sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);
    const { rows } = await database.asSuperuser.query('select urgency from flags where patient_id = $1', [
      patient.patientId,
    ]);
    expect(rows).toEqual([{ urgency: 'emergency' }]);
  });
});

it('keeps a message that was sent before the discharge when it is sent again after it', async () => {
  const { threadId } = await plantThread(database, patient);
  const phone = await web.signIn(patient);
  const message = { id: randomUUID(), text: 'Thank you.' };
  const first = await phone.call('post', `/api/threads/${threadId}/messages`, message);
  await move('discharge');
  const again = await phone.call('post', `/api/threads/${threadId}/messages`, message);
  expect(again.status).toBe(201);
  expect(again.body).toEqual(first.body);
});

it('leaves no thread open that nobody watches, whatever is written while a patient is discharged', async () => {
  const phone = await web.signIn(patient);
  const { threadId } = await plantThread(database, patient);
  const start = () =>
    phone.call('post', '/api/threads', {
      id: randomUUID(),
      subject: 'Washing',
      message: { id: randomUUID(), text: 'May I?' },
    });
  const answers = await Promise.all([
    start(),
    phone.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'And?' }),
    move('discharge'),
    desk.call('post', `/api/threads/${threadId}/close`),
    start(),
    phone.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Hello?' }),
  ]);
  for (const { status } of answers) expect([200, 201, 409]).toContain(status);
  const { rows } = await database.asSuperuser.query(
    `select 1 from threads where patient_id = $1 and state <> 'closed'`,
    [patient.patientId],
  );
  expect(rows).toEqual([]);
});
