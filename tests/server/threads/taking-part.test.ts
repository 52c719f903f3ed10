import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Role } from '#shared/access/permissions.ts';
import type { Message, ThreadSummary } from '#shared/threads/contract.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantFlag, plantThread } from '../records.ts';

// Monday 9 March 2026, 10:00 in New York: within the hours below.
const inHours = new Date('2026-03-09T14:00:00Z');
const weekdays = [1, 2, 3, 4, 5].map((weekday) => ({ weekday, opens: '08:00', closes: '17:00' }));

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let patient: TestPatient;
let phone: TestBrowser;
let now = inHours;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database, { openingHours: weekdays });
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = inHours;
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  patient = await makePatient(database, clinicId, { lead: noor });
  phone = await web.signIn(patient);
});

const signInAs = async (role: Role) => web.signIn(await makePerson(database, clinicId, [role]));
const post = (who: TestBrowser, threadId: string, text = 'One more thing.') =>
  who.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text });
const messagesOf = async (who: TestBrowser, threadId: string) =>
  ((await who.call('get', `/api/threads/${threadId}/messages`)).body as { messages: Message[] }).messages;
const listedBy = async (who: TestBrowser) =>
  ((await who.call('get', '/api/threads')).body as { threads: ThreadSummary[] }).threads.map(({ id }) => id);

describe('a therapist outside the care team', () => {
  it('finds no thread of the patient until taking part, and then that one only', async () => {
    const callum = await signInAs('therapist');
    const { threadId: other } = await plantThread(database, patient);
    const { flagId } = await plantFlag(database, patient);
    const replied = await callum.call('post', `/api/flags/${flagId}/replies`, {
      id: randomUUID(),
      text: 'I am looking after you while Noor is away.',
    });
    const { threadId } = replied.body as { threadId: string };
    for (const path of ['', '/messages']) {
      expect((await callum.call('get', `/api/threads/${other}${path}`)).status).toBe(404);
      expect((await callum.call('get', `/api/threads/${threadId}${path}`)).status).toBe(200);
    }
    expect((await post(callum, other)).status).toBe(404);
    expect((await callum.call('post', `/api/threads/${other}/seen`, { sequence: 1 })).status).toBe(404);
    expect((await callum.call('post', `/api/threads/${other}/close`)).status).toBe(404);
    expect(await listedBy(callum)).toEqual([threadId]);
    expect(await messagesOf(phone, other)).toHaveLength(1);
  });

  it('hears of the answer once taking part', async () => {
    const callum = await signInAs('therapist');
    const { flagId } = await plantFlag(database, patient);
    const { threadId } = (
      await callum.call('post', `/api/flags/${flagId}/replies`, { id: randomUUID(), text: 'Please ring us.' })
    ).body as { threadId: string };
    const { nextHint } = await callum.socket();
    await post(phone, threadId, 'I will.');
    expect(await nextHint(({ topic }) => topic === 'thread')).toEqual({
      topic: 'thread',
      threadId,
      sequence: 2,
    });
  });
});

describe('those who answer for the whole clinic', () => {
  it.each(['on-call-clinician', 'clinical-lead'] as const)('%s finds every thread of it', async (role) => {
    const { threadId } = await plantThread(database, patient);
    const desk = await signInAs(role);
    expect((await desk.call('get', `/api/threads/${threadId}`)).status).toBe(200);
    expect((await post(desk, threadId)).status).toBe(201);
  });
});

describe('somebody who is both a clinician and a patient of the clinic', () => {
  let callum: TestPatient;
  let desk: TestBrowser;

  beforeEach(async () => {
    callum = await makePatient(database, clinicId, { lead: noor, name: 'Callum Reyes' });
    await database.asSuperuser.query(`insert into person_roles values ($1, $2, 'on-call-clinician')`, [
      clinicId,
      callum.personId,
    ]);
    desk = await web.signIn(callum);
  });

  it("writes as the clinic in a patient's thread and as the patient in their own", async () => {
    const [theirs, own] = [await plantThread(database, patient), await plantThread(database, callum)];
    const written = (await post(desk, theirs.threadId)).body as Message;
    expect(written.author).toMatchObject({ name: 'Callum Reyes', side: 'clinic' });
    const asked = (await post(desk, own.threadId)).body as Message;
    expect(asked.author).toMatchObject({ name: 'Callum Reyes', side: 'patient' });
  });

  it('answers a flag as the clinic, and its patient is told', async () => {
    const { flagId } = await plantFlag(database, patient);
    const { nextHint } = await phone.socket();
    const replied = await desk.call('post', `/api/flags/${flagId}/replies`, {
      id: randomUUID(),
      text: 'Please ring us.',
    });
    expect(replied.status, replied.text).toBe(201);
    await nextHint(({ topic }) => topic === 'thread');
    const { threadId } = replied.body as { threadId: string };
    expect((await messagesOf(phone, threadId))[0]?.author).toMatchObject({ side: 'clinic' });
    const { rows } = await database.asSuperuser.query(
      `select person_id from notifications where kind = 'new-message' and path = $1`,
      [`/messages/${threadId}`],
    );
    expect(rows).toEqual([{ person_id: patient.personId }]);
  });
});

describe('out of hours', () => {
  // Friday 13 March 2026, 18:30 in New York: closed until Monday 08:00.
  const fridayEvening = new Date('2026-03-13T22:30:00Z');
  let threadId: string;

  beforeEach(async () => {
    ({ threadId } = await plantThread(database, patient));
    phone = await web.signIn(patient);
  });

  const notes = async () => (await messagesOf(phone, threadId)).filter(({ kind }) => kind === 'note');

  it('the thread says once that nobody watches, when the clinic is back and whom to call', async () => {
    now = fridayEvening;
    phone = await web.signIn(patient);
    await post(phone, threadId, 'It itches.');
    await post(phone, threadId, 'A lot.');
    const [note, ...more] = await notes();
    expect(more).toEqual([]);
    expect(note).toMatchObject({ author: null, clientId: null, sequence: 3 });
    expect(note?.text).toContain('opens Monday 08:00');
    expect(note?.text).toContain('555-0101');
    expect(note?.text).toContain('911');
    const all = await messagesOf(phone, threadId);
    expect(all.map(({ sequence }) => sequence)).toEqual([1, 2, 3, 4]);
  });

  it('says so again the next day, and only once when several messages come at once', async () => {
    now = fridayEvening;
    phone = await web.signIn(patient);
    await Promise.all(Array.from({ length: 5 }, (_, i) => post(phone, threadId, `Message ${i}`)));
    expect(await notes()).toHaveLength(1);
    now = new Date(fridayEvening.getTime() + 13 * 3_600_000);
    phone = await web.signIn(patient);
    await post(phone, threadId, 'Still.');
    expect(await notes()).toHaveLength(2);
  });

  it('says nothing while the clinic is open, nor when the clinic itself writes at night', async () => {
    await post(phone, threadId);
    expect(await notes()).toEqual([]);
    now = fridayEvening;
    await post(await web.signIn(noor), threadId, 'I read this late.');
    phone = await web.signIn(patient);
    expect(await notes()).toEqual([]);
  });
});
