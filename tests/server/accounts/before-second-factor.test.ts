import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { plantGrant } from '../caregivers/grants.ts';
import { signInPlainly } from './ways.ts';

let database: TestDatabase;
let web: TestWeb;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

it('shows staff who gave a password alone nobody whom they look after', async () => {
  const clinicId = await makeClinic(database);
  const daughter = await makePerson(database, clinicId, ['therapist', 'caregiver']);
  const father = await makePatient(database, clinicId, { name: 'Hidden Person' });
  await plantGrant(database, father, daughter);
  const half = await (await signInPlainly(web, daughter)).call('get', '/api/session');
  expect((half.body as { me: Me }).me).toMatchObject({
    secondFactor: 'missing',
    caresFor: [],
    patient: null,
  });
  expect(half.text).not.toContain('Hidden Person');
  const whole = await (await web.signIn(daughter)).call('get', '/api/session');
  expect((whole.body as { me: Me }).me.caresFor).toMatchObject([{ name: 'Hidden Person' }]);
});
