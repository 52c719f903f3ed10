import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { codeOf, countOf, invite, linkOf, plantInvited } from './scene.ts';

const hour = 60 * 60_000;
const day = 24 * hour;

let database: TestDatabase;
let web: TestWeb;
let admin: TestPerson;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  admin = await makePerson(database, await makeClinic(database), ['administrator']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = new Date();
  await database.asSuperuser.query('delete from sign_in_attempts');
});

const askAgain = (invitation: object) =>
  web.anonymous().call('post', '/api/invitations/ask-again', { invitation });

it('tells administrators and the patient’s care team once, however often it is asked', async () => {
  const lead = await makePerson(database, admin.clinicId, ['therapist']);
  const patient = await makePatient(database, admin.clinicId, { lead });
  const old = await invite(database, admin, patient);
  const newest = await invite(database, admin, patient);
  now = new Date(now.getTime() + 14 * day + hour);
  for (const key of [linkOf(old.id), linkOf(newest.id), codeOf(newest.id)]) {
    expect((await askAgain(key)).status).toBe(204);
  }
  const { rows } = await database.asSuperuser.query<{ person_id: string; path: string; kind: string }>(
    'select person_id, path, kind from notifications where occasion = $1',
    [`invitation-asked:${newest.id}`],
  );
  const told = rows.map(({ person_id }) => person_id);
  expect(told).toEqual(expect.arrayContaining([admin.personId, lead.personId]));
  expect(new Set(told).size).toBe(told.length);
  for (const { path, kind } of rows) {
    expect({ path, kind }).toEqual({ path: `/caseload/${patient.patientId}`, kind: 'invitation-asked' });
  }
  expect(
    await countOf(database, 'invitations', 'person_id = $1 and asked_again_at is not null', [
      patient.personId,
    ]),
  ).toBe(1);
  expect(
    await countOf(database, 'audit_entries', `action = 'invitation.asked-again' and subject_id = $1`, [
      patient.personId,
    ]),
  ).toBe(1);
});

it('tells the administrators of somebody who was to work here, and nobody while one is open', async () => {
  const { person, card } = await plantInvited(database, admin, 'staff');
  expect((await askAgain(linkOf(card.id))).status).toBe(204);
  const asked = () => countOf(database, 'notifications', 'path = $1', [`/clinic/people/${person.personId}`]);
  expect(await asked()).toBe(0);
  now = new Date(Date.parse(card.expiresAt));
  expect((await askAgain(linkOf(card.id))).status).toBe(204);
  expect(await asked()).toBe(1);
});

it('is slowed down from one address', async () => {
  const { card } = await plantInvited(database, admin);
  const statuses = [];
  for (let time = 0; time < 6; time += 1) statuses.push((await askAgain(linkOf(card.id))).status);
  expect(statuses).toEqual([204, 204, 204, 204, 204, 429]);
});
