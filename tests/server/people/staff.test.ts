import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { StaffPerson } from '#shared/people/contract.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { countOf, inviteBody, linkOf, plantInvited, problemOf, staffOf } from './scene.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let admin: TestPerson;
let desk: TestBrowser;
const now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
  admin = await makePerson(database, clinicId, ['administrator']);
  desk = await web.signIn(admin);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const inviteStaff = (over: Record<string, unknown> = {}) =>
  desk.call('post', '/api/people', inviteBody(over));

describe('inviting somebody to work here', () => {
  it('puts them on record with their roles and mails one invitation', async () => {
    const body = inviteBody({
      phone: '(518) 555-0142',
      timeZone: 'America/Chicago',
      roles: ['therapist', 'billing'],
    });
    const answer = await desk.call('post', '/api/people', body);
    const person = answer.body as StaffPerson;
    expect(answer.status).toBe(201);
    expect(person).toMatchObject({
      name: 'Ilse Brandt',
      credential: 'PT',
      email: body.email,
      // E.164 (ITU-T), the clinic being in the United States.
      phone: '+15185550142',
      timeZone: 'America/Chicago',
      roles: ['therapist', 'billing'],
      active: true,
      firstSignedInAt: null,
      hasSecondFactor: false,
      invitation: { state: 'open', byEmail: true },
      waiting: [],
    });
    const mailed = `person_id = $1 and kind = 'invitation'`;
    expect(await countOf(database, 'notifications', mailed, [person.id])).toBe(1);
    expect(await staffOf(desk, person.id)).toEqual(person);
  });

  it('is done once however often it is sent, also at once; with other content it is a conflict', async () => {
    const body = inviteBody({ roles: ['therapist', 'clinical-lead'], reason: 'Leads the team.' });
    const answers = await Promise.all([1, 2, 3, 4].map(() => desk.call('post', '/api/people', body)));
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    const { id } = answers[0]!.body as StaffPerson;
    expect(await countOf(database, 'invitations', 'person_id = $1', [id])).toBe(1);
    expect(await countOf(database, 'two_person_acts', 'person_id = $1', [id])).toBe(1);
    for (const other of [{ name: 'Ilse Brand' }, { roles: ['therapist'] }, { phone: '518-555-0143' }]) {
      const conflict = await desk.call('post', '/api/people', { ...body, ...other });
      expect(problemOf(conflict)).toMatchObject({ status: 409, type: 'urn:espalier:problem:id-conflict' });
    }
  });

  it('never takes the id of somebody in another clinic, whose ways in it would reach', async () => {
    const elsewhere = await makePerson(database, await makeClinic(database), ['therapist']);
    const { body } = await inviteStaff({ id: elsewhere.personId });
    expect((body as StaffPerson).id).not.toBe(elsewhere.personId);
  });

  it.each([
    {
      what: 'a number that is none',
      over: { phone: '555-0142' },
      field: 'phone',
      says: /not a telephone number/,
    },
    {
      what: 'words for a number',
      over: { phone: 'at the desk' },
      field: 'phone',
      says: /not a telephone number/,
    },
    {
      what: 'an extension',
      over: { phone: '518-555-0142 ext. 7' },
      field: 'phone',
      says: /without an extension/,
    },
    {
      what: 'a zone that is none',
      over: { timeZone: 'America/Atlantis' },
      field: 'timeZone',
      says: /not a time zone/,
    },
    {
      what: 'an offset for a zone',
      over: { timeZone: '+02:00' },
      field: 'timeZone',
      says: /not a time zone/,
    },
    {
      what: 'an address that is none',
      over: { email: 'ilse' },
      field: 'email',
      says: /not an e-mail address/,
    },
    { what: 'no role', over: { roles: [] }, field: 'roles', says: /at least one role/ },
    {
      what: 'a clinical lead who treats nobody',
      over: { roles: ['clinical-lead', 'billing'], reason: 'Leads the team.' },
      field: 'roles',
      says: /therapist or clinician on call as well/,
    },
    {
      what: 'a guarded role without a reason',
      over: { roles: ['administrator'] },
      field: 'reason',
      says: /Say why/,
    },
  ])('refuses $what beside its field and keeps nothing', async ({ over, field, says }) => {
    const before = await countOf(database, 'people', 'true', []);
    const answer = problemOf(await inviteStaff(over));
    expect(answer).toMatchObject({ status: 422, errors: [{ field }] });
    expect(answer.errors![0]!.message).toMatch(says);
    expect(await countOf(database, 'people', 'true', [])).toBe(before);
  });

  it('refuses the address of somebody who is there already, patient or staff, however it is written', async () => {
    const patient = await makePatient(database, clinicId);
    for (const email of [patient.email, admin.email.toUpperCase()]) {
      expect(problemOf(await inviteStaff({ email }))).toMatchObject({
        status: 422,
        errors: [{ field: 'email', message: 'Somebody of this clinic has this e-mail address already.' }],
      });
    }
  });

  it('puts one on record of two who are added with one address at once', async () => {
    const email = 'twice@staff.example';
    const answers = await Promise.all([inviteStaff({ email }), inviteStaff({ email })]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 422]);
    expect(await countOf(database, 'people', 'email = $1', [email])).toBe(1);
  });

  it('reads a number without a country code as one of the clinic’s country', async () => {
    const britain = await makeClinic(database, { country: 'GB' });
    const there = await web.signIn(await makePerson(database, britain, ['administrator']));
    // From the range that Ofcom keeps for drama: 020 7946 0000 to 0999.
    const answer = await there.call('post', '/api/people', inviteBody({ phone: '020 7946 0018' }));
    expect((answer.body as StaffPerson).phone).toBe('+442079460018');
  });
});

describe('the list', () => {
  it('shows who works here, somebody who is a patient as well, and no mere patient or caregiver', async () => {
    const patient = await makePatient(database, clinicId);
    const caregiver = await makePerson(database, clinicId, ['caregiver']);
    const both = await makePerson(database, clinicId, ['patient', 'billing']);
    const elsewhere = await makePerson(database, await makeClinic(database), ['therapist']);
    const { body } = await desk.call('get', '/api/people');
    const ids = (body as { people: StaffPerson[] }).people.map(({ id }) => id);
    expect(ids).toEqual(expect.arrayContaining([admin.personId, both.personId]));
    for (const { personId } of [patient, caregiver, elsewhere]) expect(ids).not.toContain(personId);
  });

  it('says who was there last when, and who has a second factor', async () => {
    const colleague = await makePerson(database, clinicId, ['therapist']);
    expect(await staffOf(desk, colleague.personId)).toMatchObject({
      lastActivityAt: null,
      hasSecondFactor: false,
    });
    await web.signIn(colleague);
    await database.asSuperuser.query(
      `insert into authenticators (person_id, clinic_id, sealed_secret, confirmed_at) values ($1, $2, 'x', now())`,
      [colleague.personId, clinicId],
    );
    expect(await staffOf(desk, colleague.personId)).toMatchObject({
      lastActivityAt: now.toISOString(),
      hasSecondFactor: true,
    });
  });

  it('opens nobody who does not work here', async () => {
    const patient = await makePatient(database, clinicId);
    const { status } = await desk.call('post', `/api/people/${patient.personId}/deactivation`, {
      reason: 'Wrong list.',
    });
    expect(status).toBe(404);
  });
});

describe('changing details', () => {
  it('keeps what was sent, and nothing where one field is wrong', async () => {
    const colleague = await makePerson(database, clinicId, ['therapist'], 'Old Name');
    const details = { name: 'New Name', credential: null, phone: '+1 518 555 0155', timeZone: null };
    const path = `/api/people/${colleague.personId}`;
    expect((await desk.call('put', path, { ...details, phone: '12' })).status).toBe(422);
    expect(await staffOf(desk, colleague.personId)).toMatchObject({ name: 'Old Name', phone: null });
    expect(await desk.call('put', path, details)).toMatchObject({
      status: 200,
      body: { name: 'New Name', phone: '+15185550155' },
    });
  });
});

describe('inviting again', () => {
  it('revokes the old one, by e-mail or on paper', async () => {
    const { person, card } = await plantInvited(database, admin, 'staff');
    const answer = await desk.call('post', `/api/people/${person.personId}/invitations`, { byEmail: false });
    expect(answer).toMatchObject({ status: 201, body: { invitation: { state: 'open', byEmail: false } } });
    const looked = await web
      .anonymous()
      .call('post', '/api/invitations/look', { invitation: linkOf(card.id) });
    expect(looked.body).toMatchObject({ state: 'revoked' });
  });

  it('is refused for a colleague who has an account: nobody takes one over alone', async () => {
    const colleague = await makePerson(database, clinicId, ['therapist']);
    const answer = await desk.call('post', `/api/people/${colleague.personId}/invitations`, {
      byEmail: false,
    });
    expect(problemOf(answer)).toMatchObject({
      status: 409,
      detail: expect.stringMatching(/signed in before/) as string,
    });
    expect(await countOf(database, 'invitations', 'person_id = $1', [colleague.personId])).toBe(0);
  });
});
