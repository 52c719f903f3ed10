import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { StaffPerson, TwoPersonAct } from '#shared/people/contract.ts';
import { makeClinic, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { countOf, inviteBody, problemOf, staffOf } from './scene.ts';

const reason = 'Leads the team from May.';
const day = 24 * 60 * 60_000;

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let admin: TestPerson;
let second: TestPerson;
let lead: TestPerson;
let colleague: TestPerson;
let desk: TestBrowser;
let secondDesk: TestBrowser;
let leadDesk: TestBrowser;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
  admin = await makePerson(database, clinicId, ['administrator']);
  second = await makePerson(database, clinicId, ['administrator']);
  lead = await makePerson(database, clinicId, ['therapist', 'clinical-lead']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = new Date();
  [desk, secondDesk, leadDesk] = [await web.signIn(admin), await web.signIn(second), await web.signIn(lead)];
  colleague = await makePerson(database, clinicId, ['therapist']);
});

const grant = (role: string, by: TestBrowser = desk, whom: TestPerson = colleague) =>
  by.call('post', `/api/people/${whom.personId}/roles`, { role, reason });
const remove = (role: string, by: TestBrowser = desk, whom: TestPerson = colleague) =>
  by.call('delete', `/api/people/${whom.personId}/roles/${role}`);
const decide = (act: TwoPersonAct, decision: string, by: TestBrowser) =>
  by.call('post', `/api/two-person-acts/${act.id}/decision`, { decision });
const askFor = async (role: string, by: TestBrowser = desk, whom: TestPerson = colleague) => {
  const answer = await grant(role, by, whom);
  expect(answer.status).toBe(200);
  return (answer.body as StaffPerson).waiting.find((act) => act.role === role)!;
};
const rolesOf = async (person: TestPerson) => (await staffOf(desk, person.personId)).roles;

describe('a guarded role', () => {
  it.each(['administrator', 'clinical-lead'])(
    '%s gives nothing until another person confirms',
    async (role) => {
      const act = await askFor(role);
      expect(act).toMatchObject({ kind: 'grant-role', role, reason, state: 'waiting', decidedBy: null });
      expect(await rolesOf(colleague)).toEqual(['therapist']);
      const answer = await decide(act, 'confirm', leadDesk);
      expect(answer).toMatchObject({ status: 200, body: { state: 'confirmed', decidedBy: lead.name } });
      expect(await rolesOf(colleague)).toEqual(expect.arrayContaining(['therapist', role]));
      expect((await staffOf(desk, colleague.personId)).waiting).toEqual([]);
    },
  );

  it('tells those who may decide, and neither the one who asked nor the one it is about', async () => {
    // What waits to be sent about an earlier act would tell of this one too.
    await database.asSuperuser.query('delete from notifications');
    const act = await askFor('administrator', desk, lead);
    const { rows } = await database.asSuperuser.query<{ person_id: string; path: string }>(
      'select person_id, path from notifications where occasion = $1',
      [`two-person-act:${act.id}`],
    );
    const told = rows.map(({ person_id }) => person_id);
    expect(told).toContain(second.personId);
    expect(told).not.toContain(admin.personId);
    expect(told).not.toContain(lead.personId);
    expect(new Set(rows.map(({ path }) => path))).toEqual(new Set(['/clinic/confirmations']));
    expect((await decide(act, 'withdraw', desk)).status).toBe(200);
  });

  it('is not confirmed or refused by the one who asked, nor by the one it is about', async () => {
    const act = await askFor('administrator', desk, lead);
    for (const decision of ['confirm', 'refuse']) {
      expect(problemOf(await decide(act, decision, desk))).toMatchObject({
        status: 409,
        detail: 'You asked for this, so another person decides.',
      });
      expect(problemOf(await decide(act, decision, leadDesk))).toMatchObject({
        status: 409,
        detail: 'This is about you, so another person decides.',
      });
    }
    expect(problemOf(await decide(act, 'withdraw', secondDesk)).status).toBe(409);
    expect((await decide(act, 'refuse', secondDesk)).body).toMatchObject({ state: 'refused' });
    expect(await rolesOf(lead)).not.toContain('administrator');
  });

  it('is decided once, of many decisions at once', async () => {
    const act = await askFor('clinical-lead');
    const answers = await Promise.all([
      ...[1, 2, 3].map(() => decide(act, 'confirm', secondDesk)),
      ...[1, 2, 3].map(() => decide(act, 'refuse', leadDesk)),
      decide(act, 'withdraw', desk),
    ]);
    const winners = answers.filter(({ status }) => status === 200);
    expect(winners).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 409)).toHaveLength(6);
    const { state } = winners[0]!.body as TwoPersonAct;
    expect((await rolesOf(colleague)).includes('clinical-lead')).toBe(state === 'confirmed');
  });

  it('is asked for once, also at once', async () => {
    const answers = await Promise.all([grant('administrator'), grant('administrator', secondDesk)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(await countOf(database, 'two_person_acts', 'person_id = $1', [colleague.personId])).toBe(1);
  });

  it('in an invitation waits, while the other roles hold at once', async () => {
    const body = inviteBody({ roles: ['therapist', 'administrator'], reason });
    const person = (await desk.call('post', '/api/people', body)).body as StaffPerson;
    expect(person.roles).toEqual(['therapist']);
    expect(person.waiting).toMatchObject([{ role: 'administrator', state: 'waiting', reason }]);
  });

  it('is not given to somebody who has left, or who no longer treats anybody; the act still waits', async () => {
    const act = await askFor('clinical-lead');
    expect((await grant('billing')).status).toBe(200);
    expect((await remove('therapist')).status).toBe(200);
    expect(problemOf(await decide(act, 'confirm', secondDesk))).toMatchObject({
      status: 409,
      detail: expect.stringMatching(/therapist or clinician on call as well/) as string,
    });
    await desk.call('post', `/api/people/${colleague.personId}/deactivation`, { reason });
    expect(problemOf(await decide(act, 'confirm', secondDesk)).detail).toMatch(/access has ended/);
    expect(await staffOf(desk, colleague.personId)).toMatchObject({
      roles: ['billing'],
      waiting: [{ id: act.id, state: 'waiting' }],
    });
  });
});

describe('roles', () => {
  it('that are not guarded hold at once; twice is a conflict', async () => {
    expect((await grant('on-call-clinician')).status).toBe(200);
    expect(await rolesOf(colleague)).toEqual(['therapist', 'on-call-clinician']);
    expect(problemOf(await grant('on-call-clinician')).detail).toBe('They hold this role already.');
  });

  it('are given to nobody by themselves', async () => {
    expect(problemOf(await grant('therapist', desk, admin)).status).toBe(409);
    expect(await rolesOf(admin)).toEqual(['administrator']);
  });

  it('go at once, but not the only one, nor what a clinical lead needs', async () => {
    expect(problemOf(await remove('therapist')).detail).toMatch(/only role/);
    expect(problemOf(await remove('therapist', desk, lead)).detail).toMatch(/therapist or clinician on call/);
    expect(problemOf(await remove('billing')).detail).toBe('They do not hold this role.');
    await grant('billing');
    expect((await remove('therapist')).body).toMatchObject({ roles: ['billing'] });
  });

  it('of staff end the long session that somebody had as a patient', async () => {
    const person = await makePerson(database, clinicId, ['patient', 'billing']);
    await database.asSuperuser.query(`delete from person_roles where person_id = $1 and role = 'billing'`, [
      person.personId,
    ]);
    // Invited to work here, and without a role of staff so far.
    await database.asSuperuser.query(
      `insert into invitations (clinic_id, person_id, kind, by_email, created_by, created_at, expires_at)
       values ($1, $2, 'staff', false, $3, now(), now())`,
      [clinicId, person.personId, admin.personId],
    );
    const phone = web.anonymous();
    const credentials = { email: person.email, password: testPassword, staySignedIn: true };
    expect((await phone.call('post', '/api/session', credentials)).status).toBe(201);
    expect((await grant('billing', desk, person)).status).toBe(200);
    expect((await phone.call('get', '/api/session')).body).toEqual({ me: null });
  });
});

describe('a second factor that was lost', () => {
  it('is removed once another person confirms, with every session, and its owner is told', async () => {
    const { personId } = colleague;
    const held = async () =>
      (await countOf(database, 'authenticators', 'person_id = $1', [personId])) +
      (await countOf(database, 'recovery_codes', 'person_id = $1', [personId])) +
      (await countOf(database, 'passkeys', 'person_id = $1', [personId]));
    const session = await web.signIn(colleague);
    for (const statement of [
      `insert into authenticators (person_id, clinic_id, sealed_secret, confirmed_at) values ($1, $2, 'x', now())`,
      `insert into recovery_codes (person_id, clinic_id, code_hash) values ($1, $2, 'x')`,
      `insert into passkeys (person_id, clinic_id, credential_id, public_key, counter, transports, backed_up, name, created_at)
       values ($1, $2, gen_random_uuid()::text, 'x', 0, '{}', false, 'Phone', now())`,
    ]) {
      await database.asSuperuser.query(statement, [personId, clinicId]);
    }
    const asked = await desk.call('post', `/api/people/${personId}/second-factor-removal`, { reason });
    const act = (asked.body as StaffPerson).waiting[0]!;
    expect(act).toMatchObject({ kind: 'remove-second-factor', role: null });
    expect(await held()).toBe(3);
    expect((await session.call('get', '/api/flags')).status).toBe(200);
    expect((await decide(act, 'confirm', secondDesk)).status).toBe(200);
    expect(await held()).toBe(0);
    expect((await session.call('get', '/api/flags')).status).toBe(401);
    const told = `person_id = $1 and kind = 'sign-in-changed'`;
    expect(await countOf(database, 'notifications', told, [personId])).toBe(1);
    const again = await web
      .anonymous()
      .call('post', '/api/session', { email: colleague.email, password: testPassword });
    expect(again).toMatchObject({ status: 201, body: { next: 'none', me: { secondFactor: 'missing' } } });
  });
});

it('lists what waits, and what was decided in the last 90 days', async () => {
  const [kept, waiting] = [await askFor('administrator'), await askFor('clinical-lead')];
  await decide(kept, 'refuse', secondDesk);
  const ids = async () => {
    const { body } = await (await web.signIn(second)).call('get', '/api/two-person-acts');
    return (body as { acts: TwoPersonAct[] }).acts.map(({ id }) => id);
  };
  now = new Date(now.getTime() + 90 * day);
  expect(await ids()).toEqual(expect.arrayContaining([kept.id, waiting.id]));
  now = new Date(now.getTime() + 1);
  expect(await ids()).toContain(waiting.id);
  expect(await ids()).not.toContain(kept.id);
});

it('asks for a fresh proof before anybody’s access or roles change', async () => {
  const path = `/api/people/${colleague.personId}`;
  now = new Date(now.getTime() + 5 * 60_000 + 1);
  const answers = [
    await desk.call('post', `${path}/deactivation`, { reason }),
    await desk.call('post', `${path}/reactivation`, { reason }),
    await desk.call('post', `${path}/roles`, { role: 'billing', reason }),
    await desk.call('delete', `${path}/roles/therapist`),
    await desk.call('post', `/api/two-person-acts/${colleague.personId}/decision`, { decision: 'confirm' }),
  ];
  for (const answer of answers) {
    expect(problemOf(answer)).toMatchObject({ status: 403, type: 'urn:espalier:problem:proof-needed' });
  }
});
