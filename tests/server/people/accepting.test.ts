import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { PasskeyQuestion } from '#server/features/accounts/passkeys.ts';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { makeClinic, makePatient, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import {
  codeOf,
  countOf,
  invite,
  linkOf,
  newPassword,
  plantInvited,
  plantNewcomer,
  problemOf,
} from './scene.ts';

let database: TestDatabase;
let web: TestWeb;
let admin: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  admin = await makePerson(database, await makeClinic(database), ['administrator']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const byPassword = { kind: 'password', password: newPassword };
const accept = (invitation: object, way: object = byPassword, browser: TestBrowser = web.anonymous()) =>
  browser.call('post', '/api/invitations/accept', { invitation, way });
const look = async (invitation: object) =>
  (await web.anonymous().call('post', '/api/invitations/look', { invitation })).body as { state: string };
const signIn = (email: string, password: string) =>
  web.anonymous().call('post', '/api/session', { email, password });
const passkeyFor = async (invitation: object, phone = softAuthenticator(web.url)) => {
  const asked = await web.anonymous().call('post', '/api/invitations/passkey-question', { invitation });
  expect(asked.status).toBe(200);
  return { kind: 'passkey', passkey: phone.register(asked.body as PasskeyQuestion) };
};
const credentialsOf = (personId: string) => countOf(database, 'credentials', 'person_id = $1', [personId]);

describe('accepting an invitation', () => {
  it('makes an account with a password, signs in, and leaves one record of it', async () => {
    const { person, card } = await plantInvited(database, admin);
    const browser = web.anonymous();
    const answer = await accept(codeOf(card.id), byPassword, browser);
    expect(answer).toMatchObject({
      status: 201,
      body: { me: { personId: person.personId, roles: ['patient'], secondFactor: 'not-needed' } },
    });
    browser.me = (answer.body as { me: Me }).me;
    expect((await browser.call('get', '/api/session')).body).toMatchObject({ me: { email: person.email } });
    expect((await signIn(person.email, newPassword)).status).toBe(201);
    expect(await look(linkOf(card.id))).toMatchObject({ state: 'used', email: null, firstName: null });
    expect(problemOf(await accept(linkOf(card.id)))).toMatchObject({
      status: 410,
      detail: 'This invitation has been used already. Sign in, or ask the clinic for a new one.',
    });
    const entry = `action = 'invitation.accepted' and subject_id = $1 and person_id = $2`;
    expect(await countOf(database, 'audit_entries', entry, [card.id, person.personId])).toBe(1);
    expect(
      await countOf(database, 'people', 'id = $1 and first_signed_in_at is not null', [person.personId]),
    ).toBe(1);
  });

  it('keeps the address in lower case and NFC, so that it is found however it is typed', async () => {
    const { card } = await plantInvited(database, admin, 'patient', 'Zoe\u0308.Q@New.example');
    expect((await accept(linkOf(card.id))).status).toBe(201);
    expect((await signIn('ZO\u00cb.q@new.EXAMPLE', newPassword)).status).toBe(201);
  });

  it('makes a passkey without a password, for two people on the same phone', async () => {
    const phone = softAuthenticator(web.url);
    const people = [await plantInvited(database, admin), await plantInvited(database, admin, 'caregiver')];
    for (const { person, card } of people) {
      const answer = await accept(linkOf(card.id), await passkeyFor(linkOf(card.id), phone));
      expect(answer).toMatchObject({ status: 201, body: { me: { personId: person.personId } } });
    }
    for (const { person } of people) {
      const asked = await web.anonymous().call('post', '/api/session/passkey-question');
      const passkey = phone.answer(asked.body as PasskeyQuestion, { personId: person.personId });
      const signedIn = await web.anonymous().call('post', '/api/session/passkey', { passkey });
      expect(signedIn).toMatchObject({ status: 201, body: { me: { personId: person.personId } } });
    }
  });

  it('counts the passkey of staff as their second factor, and asks for one after a password', async () => {
    const [first, second] = [
      await plantInvited(database, admin, 'staff'),
      await plantInvited(database, admin, 'staff'),
    ];
    expect(await accept(linkOf(first.card.id), await passkeyFor(linkOf(first.card.id)))).toMatchObject({
      status: 201,
      body: { me: { secondFactor: 'given' } },
    });
    expect(await accept(linkOf(second.card.id))).toMatchObject({
      status: 201,
      body: { me: { secondFactor: 'missing' } },
    });
  });

  it.each([
    { what: 'a short password', way: { kind: 'password', password: 'too short' } },
    { what: 'a common password', way: { kind: 'password', password: 'passwordpassword123' } },
  ])('refuses $what beside its field, and stays open', async ({ way }) => {
    const { person, card } = await plantInvited(database, admin);
    const refused = problemOf(await accept(linkOf(card.id), way));
    expect(refused.status).toBe(422);
    expect(refused.errors).toHaveLength(1);
    expect(refused.errors![0]!.field).toMatch(/password$/);
    expect(await look(linkOf(card.id))).toMatchObject({ state: 'open' });
    expect(await credentialsOf(person.personId)).toBe(0);
  });

  it('refuses a passkey that answers another question, and stays open', async () => {
    const [mine, other] = [await plantInvited(database, admin), await plantInvited(database, admin)];
    const way = await passkeyFor(linkOf(other.card.id));
    expect((await accept(linkOf(mine.card.id), way)).status).toBe(401);
    expect(await look(linkOf(mine.card.id))).toMatchObject({ state: 'open' });
    expect(await credentialsOf(mine.person.personId)).toBe(0);
  });

  it('saves nothing where somebody of another clinic has the address, and stays open', async () => {
    const elsewhere = await makePerson(database, await makeClinic(database), ['patient']);
    const { person, card } = await plantInvited(database, admin, 'patient', elsewhere.email);
    for (const way of [byPassword, await passkeyFor(linkOf(card.id))]) {
      expect(problemOf(await accept(linkOf(card.id), way))).toMatchObject({
        status: 409,
        detail:
          'Somebody signs in with this e-mail address already. Ask the clinic to invite you with another one.',
      });
    }
    expect(await look(linkOf(card.id))).toMatchObject({ state: 'open', email: elsewhere.email });
    expect(await credentialsOf(person.personId)).toBe(0);
    expect(await countOf(database, 'passkeys', 'person_id = $1', [person.personId])).toBe(0);
    expect(await countOf(database, 'invitations', 'id = $1 and accepted_at is null', [card.id])).toBe(1);
    expect((await signIn(elsewhere.email, testPassword)).status).toBe(201);
  });

  it('opens nothing for somebody who is no longer active', async () => {
    const { person, card } = await plantInvited(database, admin);
    await database.asSuperuser.query('update people set active = false where id = $1', [person.personId]);
    expect(await look(linkOf(card.id))).toMatchObject({ state: 'revoked', email: null });
    expect((await accept(linkOf(card.id))).status).toBe(410);
    expect(await credentialsOf(person.personId)).toBe(0);
  });
});

describe('a new invitation for somebody who has a way in', () => {
  it('replaces a patient’s password, ends the other sessions, and tells the patient', async () => {
    const patient = await makePatient(database, admin.clinicId);
    const before = await web.signIn(patient);
    const { ended } = await before.socket();
    const card = await invite(database, admin, patient);
    expect((await accept(linkOf(card.id))).status).toBe(201);
    await ended;
    expect((await before.call('get', '/api/today')).status).toBe(401);
    expect((await signIn(patient.email, testPassword)).status).toBe(401);
    expect((await signIn(patient.email, newPassword)).status).toBe(201);
    const told = `person_id = $1 and kind = 'sign-in-changed'`;
    expect(await countOf(database, 'notifications', told, [patient.personId])).toBe(1);
  });

  it('adds a passkey beside the password', async () => {
    const patient = await makePatient(database, admin.clinicId);
    const card = await invite(database, admin, patient);
    expect((await accept(linkOf(card.id), await passkeyFor(linkOf(card.id)))).status).toBe(201);
    expect((await signIn(patient.email, testPassword)).status).toBe(201);
    expect(await countOf(database, 'passkeys', 'person_id = $1', [patient.personId])).toBe(1);
  });

  it('lets nobody past the second factor of staff: whoever opened the letter gets no further', async () => {
    const colleague = await makePerson(database, admin.clinicId, ['therapist', 'caregiver']);
    const card = await invite(database, admin, colleague, { kind: 'caregiver' });
    for (const way of [byPassword, await passkeyFor(linkOf(card.id))]) {
      expect(problemOf(await accept(linkOf(card.id), way))).toMatchObject({
        status: 409,
        detail: 'You have an account here already. Sign in with it.',
      });
    }
    expect((await signIn(colleague.email, newPassword)).status).toBe(401);
    expect(await countOf(database, 'passkeys', 'person_id = $1', [colleague.personId])).toBe(0);
  });
});

it('waits, with the invitation open, while the only role is still to be confirmed', async () => {
  const person = await plantNewcomer(database, admin, []);
  const card = await invite(database, admin, person, { kind: 'staff' });
  expect(problemOf(await accept(linkOf(card.id)))).toMatchObject({
    status: 409,
    detail: 'The clinic has yet to confirm what you may do here. The invitation stays open; try again later.',
  });
  expect(await look(linkOf(card.id))).toMatchObject({ state: 'open' });
});
