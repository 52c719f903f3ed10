import * as argon2 from '@node-rs/argon2';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { verifyPassword } from '#server/features/accounts/passwords.ts';
import { makeClinic, makePatient, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';

// The real argon2id, watched: how often it verifies, and how many at once.
vi.mock('@node-rs/argon2', async (importOriginal) => {
  const real = await importOriginal<typeof argon2>();
  return { ...real, verify: vi.fn(real.verify) };
});
const verify = vi.mocked(argon2.verify);

let database: TestDatabase;
let web: TestWeb;
let therapist: TestPerson;
let gone: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  const clinicId = await makeClinic(database);
  therapist = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  gone = await makePerson(database, clinicId, ['therapist']);
  await database.asSuperuser.query('update people set active = false where id = $1', [gone.personId]);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  verify.mockClear();
  await database.asSuperuser.query('delete from sign_in_attempts');
});

const tryToSignIn = (email: string, password: string) =>
  web.anonymous().call('post', '/api/session', { email, password });

describe('a wrong sign-in', () => {
  it('is answered in the same words whether or not the account exists', async () => {
    const known = await tryToSignIn(therapist.email, 'not the password at all');
    const unknown = await tryToSignIn('nobody@people.example', 'not the password at all');
    const left = await tryToSignIn(gone.email, testPassword);
    expect(known.status).toBe(401);
    expect(known.body).toEqual({
      type: 'urn:espalier:problem:wrong-sign-in',
      title: 'That e-mail and password do not match.',
      status: 401,
    });
    for (const other of [unknown, left]) {
      expect([other.status, other.text]).toEqual([known.status, known.text]);
      expect(other.headers.getSetCookie()).toEqual([]);
    }
  });

  it('costs exactly one argon2id verification, like a right one, whether or not the account exists', async () => {
    const costOf = async (email: string, password: string) => {
      verify.mockClear();
      await tryToSignIn(email, password);
      return verify.mock.calls.map(([hash]) => String(hash).split('$').slice(1, 4).join(' '));
    };
    const once = ['argon2id v=19 m=19456,t=2,p=1'];
    expect(await costOf(therapist.email, 'wrong')).toEqual(once);
    expect(await costOf('nobody@people.example', 'wrong')).toEqual(once);
    expect(await costOf(therapist.email, testPassword)).toEqual(once);
  });

  it('never matches an account that does not exist', async () => {
    expect(await verifyPassword(null, testPassword)).toBe(false);
    expect(verify).toHaveBeenCalledTimes(1);
  });

  it.each([
    ['a control character in the e-mail', { email: 'noor\u0000@people.example', password: 'x' }],
    ['half a character in the password', { email: 'noor@people.example', password: '\ud800' }],
  ])('is refused and not a failure of the server, with %s', async (_what, body) => {
    const answer = await web.anonymous().call('post', '/api/session', body);
    expect([401, 422]).toContain(answer.status);
  });

  it('names every field that is missing', async () => {
    const answer = await web.anonymous().call('post', '/api/session', { email: ' ', password: '', extra: 1 });
    expect(answer.status).toBe(422);
    const { errors } = answer.body as { errors: { field: string }[] };
    expect(errors.map(({ field }) => field).sort()).toEqual(['email', 'extra', 'password']);
  });
});

it('verifies at most two passwords at a time', async () => {
  let running = 0;
  let most = 0;
  const real = await vi.importActual<typeof argon2>('@node-rs/argon2');
  verify.mockImplementation(async (...args) => {
    running += 1;
    most = Math.max(most, running);
    const matches = await real.verify(...args);
    running -= 1;
    return matches;
  });
  await Promise.all(Array.from({ length: 12 }, () => verifyPassword(null, 'wrong')));
  expect(verify).toHaveBeenCalledTimes(12);
  expect(most).toBe(2);
  verify.mockImplementation(real.verify);
});

it('lets one address fill a part of the line only, so that others still come in', async () => {
  const flood = Array.from({ length: 60 }, () => verifyPassword(null, 'wrong', '203.0.113.7'));
  const settled = Promise.allSettled(flood);
  expect(await verifyPassword(null, 'wrong', '203.0.113.8')).toBe(false);
  const refused = (await settled).filter(({ status }) => status === 'rejected');
  expect(refused.length).toBe(60 - 15 - 2);
});

describe('a right sign-in', () => {
  it('takes the e-mail in any case and the password in any Unicode form', async () => {
    const composed = 'un été à la montagne';
    const { hashPassword } = await import('#server/features/accounts/passwords.ts');
    await database.asSuperuser.query('update credentials set password_hash = $1 where person_id = $2', [
      await hashPassword(composed),
      therapist.personId,
    ]);
    const answer = await tryToSignIn(`  ${therapist.email.toUpperCase()} `, composed.normalize('NFD'));
    expect(answer.status, answer.text).toBe(201);
    expect((answer.body as { me: Me }).me).toMatchObject({
      personId: therapist.personId,
      name: 'Noor Haddad',
      roles: ['therapist'],
      patient: null,
    });
  });

  it("tells a patient's phone towards which side the free hand reaches", async () => {
    const clinicId = await makeClinic(database);
    const left = await makePatient(database, clinicId, { card: { arm: 'left' } });
    const right = await makePatient(database, clinicId, { card: { arm: 'right' } });
    expect((await web.signIn(left)).me?.patient).toMatchObject({ arm: 'left', controlsTowards: 'right' });
    expect((await web.signIn(right)).me?.patient).toMatchObject({ arm: 'right', controlsTowards: 'left' });
  });
});
