import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { CaregiverCard, ClinicCaregiverCard, PatientRecord } from '#shared/patients/contract.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { actingFor, plantGrant } from './grants.ts';

const minuteMs = 60_000;
const start = new Date('2026-12-01T15:00:00Z');
let now = start;
let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let ines: TestPatient;
let phone: TestBrowser;

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
  now = start;
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  ines = await makePatient(database, clinicId, { lead: noor, name: 'Ines Valcourt' });
  phone = await web.signIn(ines);
});

const body = (email: string, changes: Record<string, unknown> = {}) => ({
  id: randomUUID(),
  name: 'Teo Valcourt',
  email,
  relationship: 'husband',
  mayCheckIn: true,
  mayMessage: true,
  until: null,
  ...changes,
});
const invite = (sent: unknown) => phone.call('post', '/api/caregivers', sent);
const listed = async (): Promise<CaregiverCard[]> => {
  const { body } = await phone.call('get', '/api/caregivers');
  return (body as { caregivers: CaregiverCard[] }).caregivers;
};
const inRecord = async (): Promise<ClinicCaregiverCard[]> => {
  const desk = await web.signIn(noor);
  return ((await desk.call('get', `/api/patients/${ines.patientId}`)).body as PatientRecord).caregivers;
};
const toldTo = async (personId: string) =>
  (
    await database.asSuperuser.query<{ kind: string; channel: string; path: string }>(
      'select kind, channel, path from notifications where person_id = $1',
      [personId],
    )
  ).rows;
const askedByMail = [{ kind: 'caring-began', channel: 'email', path: '/caring' }];

/** Somebody of the clinic who signed in for the first time a month ago. */
const known: Record<string, () => Promise<TestPerson>> = {
  'another patient': () => makePatient(database, clinicId, { lead: noor, name: 'Known Already' }),
  'a therapist': () => makePerson(database, clinicId, ['therapist'], 'Known Already'),
  'an administrator': () => makePerson(database, clinicId, ['administrator'], 'Known Already'),
  'a caregiver of somebody': async () => {
    const person = await makePerson(database, clinicId, ['caregiver'], 'Known Already');
    await plantGrant(database, await makePatient(database, clinicId, { lead: noor }), person);
    return person;
  },
};
const knownPerson = async (which: string): Promise<TestPerson> => {
  const person = await known[which]!();
  // In capitals, as a clinic may have written it: it is one and the same address.
  await database.asSuperuser.query(
    'update people set first_signed_in_at = $2, email = upper(email) where id = $1',
    [person.personId, new Date(start.getTime() - 30 * 24 * 60 * minuteMs)],
  );
  return person;
};

describe('a patient cannot tell whom the clinic knows', () => {
  it.each(Object.keys(known))(
    'inviting %s is answered and listed as inviting an unknown address is',
    async (which) => {
      const person = await knownPerson(which);
      const sent = [body(`${randomUUID()}@people.example`), body(person.email)];
      const answers = [await invite(sent[0]), await invite(sent[1])];
      expect(answers.map(({ status }) => status)).toEqual([201, 201]);
      const list = await listed();
      for (const cards of [
        answers.map((answer) => answer.body as CaregiverCard),
        sent.map(({ id }) => list.find((card) => card.id === id)!),
      ]) {
        expect(cards.map(({ id, email }) => ({ id, email }))).toEqual(
          sent.map(({ id, email }) => ({ id, email })),
        );
        const [unknown, other] = cards.map((card) => ({ ...card, id: '', email: '' }));
        expect(other).toStrictEqual(unknown);
        expect(other).toMatchObject({ name: 'Teo Valcourt', firstOpenedAt: null });
        expect(other).not.toHaveProperty('invitation');
      }
    },
  );

  it('also after changing what they may do, and after the end', async () => {
    const person = await knownPerson('another patient');
    const sent = body(person.email);
    await invite(sent);
    const limits = { relationship: 'spouse', mayCheckIn: false, mayMessage: false, until: null };
    const changed = await phone.call('put', `/api/caregivers/${sent.id}`, limits);
    const ended = await phone.call('delete', `/api/caregivers/${sent.id}`);
    for (const { text } of [changed, ended]) {
      expect(text).toContain('Teo Valcourt');
      expect(text).not.toContain('Known Already');
    }
  });

  it('has opened the record only once somebody looked at it on the patient’s side', async () => {
    const person = await knownPerson('a therapist');
    await invite(body(person.email));
    const own = await web.signIn(person);
    now = new Date(start.getTime() + 4 * minuteMs);
    const reason = { reason: 'Covering for a colleague today.' };
    expect((await own.call('post', `/api/patients/${ines.patientId}/openings`, reason)).status).toBe(204);
    expect((await own.call('get', `/api/patients/${ines.patientId}`)).status).toBe(200);
    expect((await listed()).map(({ firstOpenedAt }) => firstOpenedAt)).toEqual([null]);
    for (const minutes of [8, 14]) {
      now = new Date(start.getTime() + minutes * minuteMs);
      expect((await own.call('get', '/api/today', undefined, actingFor(ines))).status).toBe(200);
    }
    expect((await listed()).map(({ firstOpenedAt }) => firstOpenedAt)).toEqual(['2026-12-01T15:08:00.000Z']);
  });
});

describe('somebody who has an account and is let in', () => {
  it.each(Object.keys(known))('is told by one mail that they are asked to help: %s', async (which) => {
    const person = await knownPerson(which);
    const sent = body(person.email);
    await Promise.all([invite(sent), invite(sent)]);
    expect(await toldTo(person.personId)).toEqual(askedByMail);
  });

  it('is told by mail also where the clinic prints its letters, and stands in the record by their own name', async () => {
    const person = await knownPerson('another patient');
    const desk = await web.signIn(noor);
    const sent = { ...body(person.email), byEmail: false, consent: 'Said so at the visit.' };
    const answer = await desk.call('post', `/api/patients/${ines.patientId}/caregivers`, sent);
    expect(answer.status, answer.text).toBe(201);
    expect(await toldTo(person.personId)).toEqual(askedByMail);
    expect(await inRecord()).toMatchObject([
      { name: 'Known Already', invitation: null, firstOpenedAt: null },
    ]);
    expect((await listed()).map(({ name }) => name)).toEqual(['Teo Valcourt']);
  });
});

it('the clinic sees the invitation that a grant made, and nobody new is told twice', async () => {
  const sent = body(`${randomUUID()}@people.example`);
  await invite(sent);
  expect(await inRecord()).toMatchObject([
    { name: 'Teo Valcourt', invitation: { state: 'open', byEmail: true } },
  ]);
  const { rows } = await database.asSuperuser.query<{ kind: string }>(
    `select n.kind from notifications n join people p on p.id = n.person_id where p.email = $1`,
    [sent.email],
  );
  expect(rows).toEqual([{ kind: 'invitation' }]);
});
