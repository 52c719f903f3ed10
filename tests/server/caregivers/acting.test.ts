import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import type { FlagCase } from '#shared/triage/contract.ts';
import type { Today } from '#shared/plans/contract.ts';
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
import { actingFor, plantGrant } from './grants.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let ines: TestPatient;
let teo: TestPerson;
let caregiverId: string;
let his: TestBrowser;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = new Date();
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  ines = await makePatient(database, clinicId, { lead: noor, name: 'Ines Valcourt' });
  teo = await makePerson(database, clinicId, ['caregiver'], 'Teo Valcourt');
  ({ caregiverId } = await plantGrant(database, ines, teo));
  his = await web.signIn(teo);
});

const asTeo = (...[method, path, body]: Parameters<TestBrowser['call']>) =>
  his.call(method, path, body, actingFor(ines));
const limit = (changes: string) =>
  database.asSuperuser.query(`update caregivers set ${changes} where id = $1`, [caregiverId]);
const newThread = () => ({
  id: randomUUID(),
  subject: 'Washing',
  message: { id: randomUUID(), text: 'May she?' },
});
const evaluate = () => sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);

describe('a caregiver', () => {
  it('sees Today and the plan of whom they look after, whatever else they may', async () => {
    await limit('may_check_in = false, may_message = false');
    const today = await asTeo('get', '/api/today');
    expect((today.body as Today).firstName).toBe('Ines');
    expect((await asTeo('get', '/api/my-plan')).status).toBe(200);
  });

  it('has no record without saying whose, and none of anybody who did not let them in', async () => {
    const other = await makePatient(database, clinicId, { lead: noor });
    expect((await his.call('get', '/api/today')).status).toBe(403);
    expect((await his.call('get', '/api/today', undefined, actingFor(other))).status).toBe(404);
  });

  it('checks in for the patient, as themselves, and the clinic sees who answered', async () => {
    const sent = checkInBody({ answers: { painNow: 3, symptoms: ['fall'] } });
    expect((await asTeo('post', '/api/check-ins', sent)).status).toBe(201);
    await evaluate();
    const { rows } = await database.asSuperuser.query<{ id: string; author: string }>(
      `select f.id, c.author_id as author from flags f join check_ins c on c.client_id = f.source_client_id
       where f.patient_id = $1`,
      [ines.patientId],
    );
    expect(rows).toMatchObject([{ author: teo.personId }]);
    const opened = await (await web.signIn(noor)).call('get', `/api/flags/${rows[0]!.id}`);
    expect((opened.body as FlagCase).answeredBy).toEqual({ name: 'Teo Valcourt', relationship: 'husband' });
  });

  it('is told whom to call where they may not check in', async () => {
    await limit('may_check_in = false');
    for (const answer of [
      await asTeo('get', '/api/check-in-context'),
      await asTeo('post', '/api/check-ins', checkInBody()),
      await asTeo('post', '/api/alerts', alertBody()),
    ]) {
      expect(answer.status).toBe(403);
      expect(answer.text).toContain('911');
      expect(answer.text).toContain('555-0100');
    }
  });

  it('finds an alert of their own again only while acting for its patient', async () => {
    const alert = alertBody();
    expect((await asTeo('post', '/api/alerts', alert)).status).toBe(201);
    const other = await makePatient(database, clinicId, { lead: noor });
    await plantGrant(database, other, teo);
    expect((await asTeo('get', `/api/alerts/${alert.id}`)).status).toBe(200);
    expect((await his.call('get', `/api/alerts/${alert.id}`, undefined, actingFor(other))).status).toBe(404);
    const again = await his.call('post', '/api/alerts', alert, actingFor(other));
    expect(again.body).toMatchObject({ type: 'urn:espalier:problem:id-conflict' });
  });
});

describe('a thread with a caregiver in it', () => {
  const messagesOf = async (who: TestBrowser, threadId: string) =>
    ((await who.call('get', `/api/threads/${threadId}/messages`)).body as { messages: Message[] }).messages;

  it('is the patient’s: begun by the caregiver, it is marked, and the patient takes part', async () => {
    const started = await asTeo('post', '/api/threads', newThread());
    expect(started.status, started.text).toBe(201);
    const thread = started.body as ThreadDetail;
    expect(thread).toMatchObject({ patient: { id: ines.patientId }, state: 'waiting-on-us' });
    expect(thread.participants.map(({ name, side }) => ({ name, side }))).toEqual([
      { name: 'Ines Valcourt', side: 'patient' },
      { name: 'Teo Valcourt', side: 'patient' },
    ]);
    const desk = await web.signIn(noor);
    expect((await messagesOf(desk, thread.id))[0]?.author).toEqual({
      personId: teo.personId,
      name: 'Teo Valcourt',
      side: 'patient',
      relationship: 'husband',
    });
    const phone = await web.signIn(ines);
    expect(await messagesOf(phone, thread.id)).toHaveLength(1);
  });

  it('tells patient and caregiver alike of an answer, and both of them count it as unseen', async () => {
    const { threadId } = await plantThread(database, ines);
    const desk = await web.signIn(noor);
    const { nextHint } = await his.socket();
    await desk.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Yes.' });
    await nextHint(({ topic }) => topic === 'thread');
    const { rows } = await database.asSuperuser.query<{ person_id: string }>(
      `select distinct person_id from notifications where kind = 'new-message' and path = $1`,
      [`/messages/${threadId}`],
    );
    expect(rows.map(({ person_id }) => person_id).sort()).toEqual([ines.personId, teo.personId].sort());
    const unseen = async (answer: Promise<{ body: unknown }>) =>
      ((await answer).body as Today).unseenMessages;
    const phone = await web.signIn(ines);
    expect(await unseen(asTeo('get', '/api/today'))).toBe(1);
    await asTeo('post', `/api/threads/${threadId}/seen`, { sequence: 2 });
    expect(await unseen(asTeo('get', '/api/today'))).toBe(0);
    expect(await unseen(phone.call('get', '/api/today'))).toBe(1);
  });

  it('is not there for a caregiver who may not message', async () => {
    const { threadId } = await plantThread(database, ines);
    await limit('may_message = false');
    expect((await asTeo('get', '/api/threads')).body).toEqual({ threads: [] });
    expect((await asTeo('get', `/api/threads/${threadId}`)).status).toBe(404);
    expect((await asTeo('post', '/api/threads', newThread())).status).toBe(403);
    const desk = await web.signIn(noor);
    await desk.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Yes.' });
    const { rows } = await database.asSuperuser.query('select 1 from notifications where person_id = $1', [
      teo.personId,
    ]);
    expect(rows).toEqual([]);
  });

  it('stays closed to a therapist who cared for the patient and no longer does', async () => {
    await database.asSuperuser.query(`insert into person_roles values ($1, $2, 'therapist')`, [
      clinicId,
      teo.personId,
    ]);
    his = await web.signIn(teo);
    const thread = (await asTeo('post', '/api/threads', newThread())).body as ThreadDetail;
    await limit('ended_at = now()');
    expect((await his.call('get', `/api/threads/${thread.id}`)).status).toBe(404);
  });
});

describe('a caregiver whose help has ended', () => {
  it('finds nothing at the next request, and hears nothing more on an open socket', async () => {
    const { threadId } = await plantThread(database, ines);
    const phone = await web.signIn(ines);
    const { hints, nextHint } = await his.socket();
    const alongside = await phone.socket();
    expect((await phone.call('delete', `/api/caregivers/${caregiverId}`)).status).toBe(200);
    expect((await asTeo('get', '/api/today')).status).toBe(404);
    // His own screens are told to ask who he is; once they were, he is out of the patient's room.
    await nextHint(({ topic }) => topic === 'session');
    hints.length = 0;
    await phone.call('post', '/api/check-ins', checkInBody());
    await phone.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Alone now.' });
    await alongside.nextHint(({ topic }) => topic === 'today');
    await alongside.nextHint(({ topic }) => topic === 'thread');
    expect(hints).toEqual([]);
  });

  it('finds nothing once the last day is over, by the patient’s calendar', async () => {
    // Noon on 30 November in New York is the last day; 04:59 in UTC still belongs to it, 05:00 does not.
    await limit(`until_date = '2026-11-30'`);
    const at = async (instant: string) => {
      now = new Date(instant);
      his = await web.signIn(teo);
      return (await asTeo('get', '/api/today')).status;
    };
    expect(await at('2026-11-30T17:00:00Z')).toBe(200);
    expect(await at('2026-12-01T04:59:59Z')).toBe(200);
    expect(await at('2026-12-01T05:00:00Z')).toBe(404);
  });

  it('is every caregiver of a record that has ended', async () => {
    const desk = await web.signIn(noor);
    await desk.call('post', `/api/patients/${ines.patientId}/moves`, { move: 'end', reason: 'Moved away.' });
    expect((await asTeo('get', '/api/today')).status).toBe(404);
  });
});
