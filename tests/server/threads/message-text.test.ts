import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Message } from '#shared/threads/contract.ts';
import { makeClinic, makePatient, makePerson, type TestPatient } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantThread } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let patient: TestPatient;
let phone: TestBrowser;
let desk: TestBrowser;
let threadId: string;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  const clinicId = await makeClinic(database);
  const lead = await makePerson(database, clinicId, ['therapist']);
  patient = await makePatient(database, clinicId, { lead });
  phone = await web.signIn(patient);
  desk = await web.signIn(lead);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  ({ threadId } = await plantThread(database, patient));
});

const post = (who: TestBrowser, text: string) =>
  who.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text });
const page = async (who: TestBrowser) =>
  (await who.call('get', `/api/threads/${threadId}/messages`)).body as { messages: Message[] };

describe('the text of a message', () => {
  it.each([
    ['markup', '<script>alert(1)</script> <b>5 > 3</b> &amp; "quotes"'],
    ['right-to-left overrides', 'abc \u202Eevil\u202C \u2066isolated\u2069'],
    ['emoji made of several characters', '👩🏽‍⚕️ 👍🏿 e\u0301'],
    ['line breaks and tabs', 'one\ntwo\r\n\tthree'],
    ['eight thousand characters', 'x'.repeat(8000)],
  ])('with %s comes back exactly as it was sent', async (_what, text) => {
    const sent = await post(phone, text);
    expect(sent.status, sent.text).toBe(201);
    expect((await page(desk)).messages.at(-1)?.text).toBe(text);
  });

  it.each([
    ['a zero byte', 'a\u0000b'],
    ['a bell', 'a\u0007b'],
    ['an escape', '\u001b[31mred'],
    ['half a character', 'broken \udc00'],
    ['nothing but blanks', ' \n\t '],
    ['more than eight thousand characters', 'x'.repeat(8001)],
  ])('with %s is refused, with the field named, and nothing is kept', async (_what, text) => {
    const refused = await post(phone, text);
    expect([refused.status, refused.body]).toMatchObject([422, { errors: [{ field: 'text' }] }]);
    expect((await page(phone)).messages).toHaveLength(1);
  });

  it('of a subject is held to the same: no zero byte', async () => {
    const message = { id: randomUUID(), text: 'Hello.' };
    const refused = await phone.call('post', '/api/threads', {
      id: randomUUID(),
      subject: 'a\u0000',
      message,
    });
    expect([refused.status, refused.body]).toMatchObject([422, { errors: [{ field: 'subject' }] }]);
  });
});
