import pg from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { hintChannel } from '#server/realtime/announce.ts';
import { makeClinic, makePerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { enrolBody, listOf, rowOf } from './bodies.ts';

/** Words that stand nowhere else: in names, an allergy, a reason, an agreement. */
const canaries = ['Zebedee', 'Quillfeather', 'marzipan', 'bassoon', 'crocodile'];

let database: TestDatabase;
let web: TestWeb;
let listening: pg.Client;
const payloads: string[] = [];

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  listening = new pg.Client({ connectionString: database.urls.app });
  await listening.connect();
  listening.on('notification', ({ payload }) => payloads.push(payload ?? ''));
  await listening.query(`listen ${hintChannel}`);
});

afterAll(async () => {
  await listening.end();
  await web.stop();
  await database.drop();
});

it('lets no name, fact or reason of a record into notifications, jobs, hints, audit or refusals', async () => {
  const clinicId = await makeClinic(database);
  const noor = await makePerson(database, clinicId, ['therapist']);
  const desk = await web.signIn(noor);
  const refusals: string[] = [];
  const call = async (...request: Parameters<typeof desk.call>) => {
    const answer = await desk.call(...request);
    if (answer.status >= 400) refusals.push(answer.text);
    return answer.status;
  };
  const facts = { name: 'Zebedee Quillfeather', allergies: 'marzipan' };
  const body = enrolBody(noor, { identity: facts, invite: 'email' });
  const path = `/api/patients/${body.id}`;
  const { identity, operation, careTeam } = body;
  expect(await call('post', '/api/patients', body)).toBe(201);
  expect(
    await call('post', '/api/patients', { ...body, identity: { ...identity, address: 'Elsewhere' } }),
  ).toBe(409);
  const { revision } = (await desk.call('get', path)).body as PatientRecord;
  const change = { revision, identity: { ...identity, language: 'Dutch' }, operation, careTeam };
  expect(await call('put', path, { ...change, identity: { ...identity, phone: 'bassoon' } })).toBe(422);
  expect(await call('put', path, change)).toBe(200);
  // Made from a record that is no longer the present one.
  expect(await call('put', path, { ...change, identity: { ...identity, address: 'Elsewhere' } })).toBe(409);
  expect(
    await call('post', '/api/patient-imports', { text: listOf([rowOf(noor, facts)]), invite: 'email' }),
  ).toBe(201);
  expect(await call('post', `${path}/openings`, { reason: 'Asked about the bassoon.' })).toBe(204);
  const caregiver = {
    id: body.id,
    name: 'Zebedee Quillfeather',
    email: 'z.q@people.example',
    relationship: 'crocodile',
    mayCheckIn: true,
    mayMessage: true,
    until: null,
    byEmail: true,
    consent: 'Nodded at the crocodile.',
  };
  expect(await call('post', `${path}/caregivers`, caregiver)).toBe(201);
  expect(
    await call('post', `${path}/moves`, { move: 'discharge', reason: 'The bassoon is played again.' }),
  ).toBe(200);

  const { rows } = await database.asSuperuser.query<{ text: string }>(
    `select n::text as text from notifications n union all select j::text from jobs.job j
     union all select a::text from audit_entries a union all select i::text from invitations i
     union all select t::text from one_time_tokens t`,
  );
  expect(rows.length).toBeGreaterThan(8);
  expect(payloads.length).toBeGreaterThan(0);
  const left = [...rows.map(({ text }) => text), ...payloads, ...refusals].join('\n');
  for (const canary of canaries) expect(left).not.toContain(canary);
});
