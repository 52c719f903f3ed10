import { afterAll, beforeAll, expect, it } from 'vitest';
import type { InvitationLetter } from '#shared/people/contract.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { codeOf, invite, linkOf, newPassword, plantInvited, problemOf } from './scene.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let admin: TestPerson;
let desk: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  admin = await makePerson(database, clinicId, ['administrator']);
  desk = await web.signIn(admin);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

it('shows code, link and picture of an open invitation, and never once it is used', async () => {
  const { person, card } = await plantInvited(database, admin);
  const answer = await desk.call('get', `/api/invitations/${card.id}/letter`);
  expect(answer.status).toBe(200);
  const letter = answer.body as InvitationLetter;
  expect(letter).toMatchObject({
    name: person.name,
    startAddress: `${web.url}/start`,
    code: codeOf(card.id).code,
    link: `${web.url}/invitation#${linkOf(card.id).token}`,
    expiresAt: card.expiresAt,
  });
  expect(letter.code).toMatch(/^[0-9A-HJKMNP-TV-Z]{5}-[0-9A-HJKMNP-TV-Z]{5}$/);
  const [head, data = ''] = letter.picture.split(',');
  expect(head).toBe('data:image/svg+xml;base64');
  expect(Buffer.from(data, 'base64').toString()).toMatch(/^<svg [^]*<\/svg>\s*$/);
  const accepted = await web.anonymous().call('post', '/api/invitations/accept', {
    invitation: { code: letter.code },
    way: { kind: 'password', password: newPassword },
  });
  expect(accepted.status).toBe(201);
  expect(problemOf(await desk.call('get', `/api/invitations/${card.id}/letter`))).toMatchObject({
    status: 409,
    detail: 'This invitation can no longer be used. Make a new one.',
  });
});

it('is there for administrators alone where it is for somebody who is to work here', async () => {
  const { card } = await plantInvited(database, admin, 'staff');
  const clinician = await web.signIn(await makePerson(database, clinicId, ['therapist']));
  expect((await clinician.call('get', `/api/invitations/${card.id}/letter`)).status).toBe(404);
  expect((await desk.call('get', `/api/invitations/${card.id}/letter`)).status).toBe(200);
  const patient = await makePatient(database, clinicId);
  const own = await invite(database, admin, patient);
  expect((await clinician.call('get', `/api/invitations/${own.id}/letter`)).status).toBe(200);
});
