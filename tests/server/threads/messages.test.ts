import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantThread } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let patient: TestPatient;
let desk: TestBrowser;
let phone: TestBrowser;
let threadId: string;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  patient = await makePatient(database, clinicId, { lead: noor });
  desk = await web.signIn(noor);
  phone = await web.signIn(patient);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  ({ threadId } = await plantThread(database, patient));
});

const post = (who: TestBrowser, text: string, id: string = randomUUID(), thread = threadId) =>
  who.call('post', `/api/threads/${thread}/messages`, { id, text });
const page = async (who: TestBrowser, after = 0) =>
  (await who.call('get', `/api/threads/${threadId}/messages?after=${after}`)).body as {
    messages: Message[];
    lastSequence: number;
  };
const open = async (who: TestBrowser) =>
  (await who.call('get', `/api/threads/${threadId}`)).body as ThreadDetail;

describe('the order of a thread', () => {
  it('is one without gaps when both sides post ten times at once, and both read the same', async () => {
    const sides = [phone, desk];
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, i) => post(sides[i % 2]!, `Message ${i}`)),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array.from({ length: 10 }, () => 201));
    const onPhone = await page(phone);
    expect(onPhone.messages.map(({ sequence }) => sequence)).toEqual(
      Array.from({ length: 11 }, (_, i) => i + 1),
    );
    expect(onPhone.lastSequence).toBe(11);
    expect(await page(desk)).toEqual(onPhone);
    const answered = answers.map(({ body }) => body as Message);
    for (const message of answered) {
      expect(onPhone.messages[message.sequence - 1]).toEqual(message);
    }
  });
});

describe('a message sent again', () => {
  it('with the same text is the same message, also ten times at once', async () => {
    const id = randomUUID();
    const answers = await Promise.all(Array.from({ length: 10 }, () => post(phone, 'Once.', id)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    expect((await page(phone)).messages).toHaveLength(2);
  });

  it('with another text is a conflict, and the first stays', async () => {
    const id = randomUUID();
    await post(phone, 'First.', id);
    const other = await post(phone, 'Second.', id);
    expect([other.status, other.body]).toMatchObject([409, { type: 'urn:espalier:problem:id-conflict' }]);
    expect((await page(phone)).messages.at(-1)?.text).toBe('First.');
  });

  it('under an id that the other side has used is a message of its own', async () => {
    const id = randomUUID();
    expect((await post(phone, 'From the phone.', id)).status).toBe(201);
    expect((await post(desk, 'From the desk.', id)).status).toBe(201);
    expect((await page(phone)).messages).toHaveLength(3);
  });

  it('into two threads at once is one message and a conflict', async () => {
    const id = randomUUID();
    const other = await plantThread(database, patient);
    for (let i = 0; i < 5; i += 1) {
      const again = randomUUID();
      const answers = await Promise.all([
        post(phone, 'Where?', again),
        post(phone, 'Where?', again, other.threadId),
      ]);
      expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    }
    expect((await post(phone, 'Here.', id)).status).toBe(201);
    expect((await post(phone, 'Here.', id, other.threadId)).status).toBe(409);
  });
});

describe('a thread started', () => {
  const start = (body: object) => phone.call('post', '/api/threads', body);
  const body = () => ({
    id: randomUUID(),
    subject: 'Washing',
    message: { id: randomUUID(), text: 'May I take the sling off to wash?' },
  });

  it('again with the same ids and words is the same thread with its one message', async () => {
    const first = body();
    const answers = await Promise.all(Array.from({ length: 5 }, () => start(first)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    const threads = answers.map((answer) => answer.body as ThreadDetail);
    expect(new Set(threads.map((thread) => thread.id)).size).toBe(1);
    expect(threads[0]?.lastSequence).toBe(1);
    expect((await start(first)).status).toBe(201);
  });

  it.each([
    ['another subject', (first: ReturnType<typeof body>) => ({ ...first, subject: 'Driving' })],
    [
      'another text',
      (first: ReturnType<typeof body>) => ({ ...first, message: { ...first.message, text: 'Other.' } }),
    ],
    [
      'another message',
      (first: ReturnType<typeof body>) => ({ ...first, message: { id: randomUUID(), text: 'Other.' } }),
    ],
  ])('again under the same id with %s is a conflict, and nothing is added', async (_what, change) => {
    const first = body();
    const made = (await start(first)).body as ThreadDetail;
    const other = await start(change(first));
    expect([other.status, other.body]).toMatchObject([409, { type: 'urn:espalier:problem:id-conflict' }]);
    const { lastSequence } = (await phone.call('get', `/api/threads/${made.id}`)).body as ThreadDetail;
    expect(lastSequence).toBe(1);
  });
});

describe('catching up', () => {
  it('gives everything after a sequence in pages, and nothing past the end', async () => {
    const texts = Array.from({ length: 450 }, (_, i) => `Message ${i + 1}`);
    ({ threadId } = await plantThread(database, patient, { texts }));
    const read: string[] = [];
    const sizes: number[] = [];
    for (let after = 0; ;) {
      const { messages, lastSequence } = await page(desk, after);
      expect(lastSequence).toBe(450);
      sizes.push(messages.length);
      if (messages.length === 0) break;
      read.push(...messages.map(({ text }) => text));
      after = messages.at(-1)!.sequence;
    }
    expect(sizes).toEqual([200, 200, 50, 0]);
    expect(read).toEqual(texts);
  });

  it.each([449, 450, 451, 99_999_999_999])('asks past the end at %i without harm', async (after) => {
    expect((await page(phone, after)).messages).toEqual([]);
  });

  it.each(['-1', 'x', '1.5', '1&after=2'])('names what is no sequence: %s', async (after) => {
    const answer = await phone.call('get', `/api/threads/${threadId}/messages?after=${after}`);
    expect([answer.status, answer.body]).toMatchObject([422, { errors: [{ field: 'after' }] }]);
  });
});

describe('what was seen', () => {
  const see = async (who: TestBrowser, sequence: number) =>
    (await who.call('post', `/api/threads/${threadId}/seen`, { sequence })).body as { seenSequence: number };
  const seenBy = async (person: TestPerson) =>
    (await open(phone)).participants.find(({ personId }) => personId === person.personId);

  it('never goes backwards, and never past the last message', async () => {
    await post(phone, 'Two.');
    await post(phone, 'Three.');
    expect(await see(desk, 3)).toMatchObject({ seenSequence: 3 });
    const { seenAt } = (await seenBy(noor))!;
    expect(await see(desk, 1)).toMatchObject({ seenSequence: 3 });
    expect(await seenBy(noor)).toMatchObject({ seenSequence: 3, seenAt });
    expect(await see(desk, 9_999)).toMatchObject({ seenSequence: 3 });
  });

  it('is not what was merely answered to: a message that came while one wrote stays unseen', async () => {
    await post(desk, 'Please do not drive yet.');
    await post(phone, 'I forgot to ask about my scarf.');
    expect(await seenBy(patient)).toMatchObject({ seenSequence: 1 });
    expect((await open(phone)).unseen).toBe(1);
    await see(phone, 3);
    expect(await seenBy(patient)).toMatchObject({ seenSequence: 3 });
    expect((await open(phone)).unseen).toBe(0);
  });

  it('takes in what one writes oneself when everything before was seen', async () => {
    await see(desk, 1);
    await post(desk, 'Yes, with the elbow at your side.');
    expect(await seenBy(noor)).toMatchObject({ seenSequence: 2 });
  });
});

describe('a closed thread', () => {
  it.each([
    ['patient', 'waiting-on-us'],
    ['clinic', 'waiting-on-patient'],
  ])('opens again when the %s writes', async (side, state) => {
    const closed = await desk.call('post', `/api/threads/${threadId}/close`);
    expect(closed.body).toMatchObject({ state: 'closed' });
    expect((await desk.call('post', `/api/threads/${threadId}/close`)).status).toBe(409);
    expect((await post(side === 'patient' ? phone : desk, 'One more thing.')).status).toBe(201);
    expect(await open(desk)).toMatchObject({ state });
  });
});

it('is told to try again, and nothing is kept, while somebody holds the thread for too long', async () => {
  const holder = await database.asSuperuser.connect();
  await holder.query('begin');
  await holder.query('select from threads where id = $1 for update', [threadId]);
  const waiting = await post(phone, 'Are you there?');
  await holder.query('rollback');
  holder.release();
  expect([waiting.status, waiting.body]).toMatchObject([503, { type: 'urn:espalier:problem:unavailable' }]);
  expect((await page(phone)).messages).toHaveLength(1);
});
