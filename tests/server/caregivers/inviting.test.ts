import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ClinicCaregiverCard } from '#shared/patients/contract.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import type { ProblemBody } from '#shared/problems/problems.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { inviteBody } from '../people/scene.ts';
import { actingFor, plantGrant } from './grants.ts';

// The evening of 30 November in New York, and 1 December in UTC.
const start = new Date('2026-12-01T03:30:00Z');
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

const body = (changes: Record<string, unknown> = {}) => {
  const id = randomUUID();
  return {
    id,
    name: 'Teo Valcourt',
    email: `${id}@people.example`,
    relationship: 'husband',
    mayCheckIn: true,
    mayMessage: false,
    until: null,
    ...changes,
  };
};
const invite = (sent: unknown, who = phone) => who.call('post', '/api/caregivers', sent);
const rolesOf = async (personId: string) =>
  (
    await database.asSuperuser.query<{ role: string }>(
      'select role from person_roles where person_id = $1 order by role',
      [personId],
    )
  ).rows.map(({ role }) => role);
const personWith = async (email: string) =>
  (
    await database.asSuperuser.query<{ id: string; name: string }>(
      'select id, name from people where email = $1',
      [email],
    )
  ).rows[0]!;
const invitationsOf = async (personId: string) =>
  (
    await database.asSuperuser.query<{ kind: string; by_email: boolean }>(
      'select kind, by_email from invitations where person_id = $1',
      [personId],
    )
  ).rows;
const errorsOf = (answer: { body: unknown }) => (answer.body as ProblemBody).errors ?? [];

describe('a patient who lets somebody in', () => {
  it('makes a person with the role, a grant within limits, and an invitation by mail', async () => {
    const sent = body();
    const answer = await invite(sent);
    expect(answer.status, answer.text).toBe(201);
    expect(answer.body).toMatchObject({
      id: sent.id,
      name: 'Teo Valcourt',
      relationship: 'husband',
      mayCheckIn: true,
      mayMessage: false,
      byClinic: false,
      grantedBy: 'Ines Valcourt',
      endedAt: null,
    });
    const { id: personId } = await personWith(sent.email);
    expect(await rolesOf(personId)).toEqual(['caregiver']);
    expect(await invitationsOf(personId)).toEqual([{ kind: 'caregiver', by_email: true }]);
  });

  it('needs a fresh proof', async () => {
    now = new Date(start.getTime() + 5 * 60_000 + 1);
    expect((await invite(body())).body).toMatchObject({ type: 'urn:espalier:problem:proof-needed' });
  });

  it('lets in once when sent twice, also at once; other content under the same id is a conflict', async () => {
    const sent = body();
    const answers = await Promise.all([invite(sent), invite(sent)]);
    expect(answers.map(({ status }) => status)).toEqual([201, 201]);
    const listed = await phone.call('get', '/api/caregivers');
    expect((listed.body as { caregivers: unknown[] }).caregivers).toHaveLength(1);
    for (const other of [{ mayMessage: true }, { name: 'Teo V.' }]) {
      expect((await invite({ ...sent, ...other })).body).toMatchObject({
        type: 'urn:espalier:problem:id-conflict',
      });
    }
  });

  it.each([
    ['as it stands', (email: string) => email],
    ['in capitals', (email: string) => email.toUpperCase()],
    ['with an accent', (email: string) => email.replace('people', 'péople')],
  ])('does not give the own address %s', async (_name, written) => {
    const answer = await invite(body({ email: written(ines.email) }));
    expect(answer.status).toBe(422);
    expect(errorsOf(answer)).toEqual([
      { field: 'email', message: 'Each person needs an address of their own.' },
    ]);
  });

  it.each([
    ['2026-11-29', 422],
    ['2026-11-30', 201],
  ])('takes %s as the last day with %i, by the own calendar', async (until, status) => {
    expect((await invite(body({ until }))).status).toBe(status);
  });

  it.each(['therapist', 'patient', 'caregiver'] as const)(
    'lets in a %s of the clinic, who keeps the name they have, and adds the role',
    async (role) => {
      const known = await makePerson(database, clinicId, [role], 'Known Already');
      expect((await invite(body({ email: known.email, name: 'Somebody Else' }))).status).toBe(201);
      expect((await personWith(known.email)).name).toBe('Known Already');
      expect(await rolesOf(known.personId)).toEqual([...new Set(['caregiver', role])].sort());
    },
  );

  it('leaves the invitation of staff who have not come yet alone', async () => {
    const known = await makePerson(database, clinicId, ['therapist']);
    expect((await invite(body({ email: known.email }))).status).toBe(201);
    expect(await invitationsOf(known.personId)).toEqual([]);
  });

  it('gives nobody back what the clinic ended', async () => {
    const known = await makePerson(database, clinicId, ['therapist']);
    await database.asSuperuser.query('update people set active = false where id = $1', [known.personId]);
    expect(errorsOf(await invite(body({ email: known.email }))).map(({ field }) => field)).toEqual(['email']);
  });

  it('lets the same person in once at a time, and anew after the last day is over', async () => {
    const teo = await makePerson(database, clinicId, ['caregiver']);
    expect((await invite(body({ email: teo.email, until: '2026-11-30' }))).status).toBe(201);
    expect(errorsOf(await invite(body({ email: teo.email }))).map(({ field }) => field)).toEqual(['email']);
    now = new Date(start.getTime() + 24 * 60 * 60_000);
    phone = await web.signIn(ines);
    expect((await invite(body({ email: teo.email }))).status).toBe(201);
  });
});

describe('whom to let in', () => {
  it('is for the patient alone: nobody who acts for one decides it, nor reads who opened the record', async () => {
    const other = await makePatient(database, clinicId, { lead: noor });
    await plantGrant(database, ines, other);
    const acting = await web.signIn(other);
    const path = '/api/caregivers';
    for (const answer of [
      await acting.call('post', path, body(), actingFor(ines)),
      await acting.call('get', path, undefined, actingFor(ines)),
      await acting.call('get', '/api/activity', undefined, actingFor(ines)),
    ]) {
      expect(answer.status).toBe(403);
    }
    expect((await acting.call('get', path)).status).toBe(200);
  });
});

describe('the clinic that lets somebody in', () => {
  const asked = { byEmail: false, consent: 'Said so at the visit on 30 November.' };
  const path = () => `/api/patients/${ines.patientId}/caregivers`;

  it('keeps how the patient agreed', async () => {
    const desk = await web.signIn(noor);
    const answer = await desk.call('post', path(), { ...body(), ...asked });
    expect(answer.status, answer.text).toBe(201);
    expect(answer.body).toMatchObject({
      byClinic: true,
      consent: asked.consent,
      invitation: { byEmail: false },
    });
    expect((await desk.call('post', path(), { ...body(), ...asked, consent: ' ' })).status).toBe(422);
  });

  it('brings nobody to the letter of an administrator whose role still waits for a second person', async () => {
    const admin = await web.signIn(await makePerson(database, clinicId, ['administrator']));
    const sent = inviteBody({ roles: ['administrator'], reason: 'Runs the second site.' });
    const invited = await admin.call('post', '/api/people', sent);
    const { invitation } = invited.body as StaffPerson;
    const desk = await web.signIn(noor);
    for (const who of [ines, await makePatient(database, clinicId, { lead: noor })]) {
      const to = `/api/patients/${who.patientId}/caregivers`;
      const answer = await desk.call('post', to, { ...body({ email: sent.email }), ...asked });
      expect(answer.status, answer.text).toBe(201);
      expect((answer.body as ClinicCaregiverCard).invitation).toBeNull();
      expect((await desk.call('get', `/api/invitations/${invitation?.id}/letter`)).status).toBe(404);
    }
  });

  it('comes through the chart’s door', async () => {
    const callum = await web.signIn(await makePerson(database, clinicId, ['therapist']));
    const answer = await callum.call('post', path(), { ...body(), ...asked });
    expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:reason-needed' });
  });
});

describe('limits', () => {
  it('change from the next request on, and an ended grant is let in anew instead', async () => {
    const teo = await makePerson(database, clinicId, ['caregiver']);
    const { caregiverId } = await plantGrant(database, ines, teo);
    const limits = { relationship: 'spouse', mayCheckIn: false, mayMessage: true, until: '2026-12-24' };
    const changed = await phone.call('put', `/api/caregivers/${caregiverId}`, limits);
    expect(changed.body).toMatchObject(limits);
    expect((await phone.call('delete', `/api/caregivers/${caregiverId}`)).status).toBe(200);
    expect((await phone.call('delete', `/api/caregivers/${caregiverId}`)).status).toBe(200);
    expect((await phone.call('put', `/api/caregivers/${caregiverId}`, limits)).status).toBe(409);
  });
});
