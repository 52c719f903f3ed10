import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantFlag } from '../records.ts';

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

const claimedBy = async (holder: TestPerson): Promise<string> => {
  const { flagId } = await plantFlag(database, await makePatient(database, clinicId, { lead: holder }));
  const answer = await (await web.signIn(holder)).call('post', `/api/flags/${flagId}/claim`);
  expect(answer.status, answer.text).toBe(200);
  return flagId;
};

const flagOf = async (flagId: string) => {
  const { rows } = await database.asSuperuser.query<{ state: string; claimed_by: string | null }>(
    'select state, claimed_by from flags where id = $1',
    [flagId],
  );
  return rows[0];
};

const closing = { outcome: 'advised-by-phone', worthRaising: 'yes', note: '' };

it('opens a flag again whose holder’s access ends, for a colleague to close, and says who did it', async () => {
  const leaving = await makePerson(database, clinicId, ['therapist']);
  const colleague = await web.signIn(await makePerson(database, clinicId, ['therapist']));
  const flagId = await claimedBy(leaving);
  expect((await colleague.call('post', `/api/flags/${flagId}/close`, closing)).status).toBe(409);
  const ended = await desk.call('post', `/api/people/${leaving.personId}/deactivation`, {
    reason: 'Has left the clinic.',
  });
  expect(ended.status, ended.text).toBe(200);
  expect(await flagOf(flagId)).toEqual({ state: 'open', claimed_by: null });
  const { rows } = await database.asSuperuser.query(
    `select by_person_id from flag_events where flag_id = $1 and kind = 'released'`,
    [flagId],
  );
  expect(rows).toEqual([{ by_person_id: admin.personId }]);
  const closed = await colleague.call('post', `/api/flags/${flagId}/close`, closing);
  expect(closed.status, closed.text).toBe(200);
});

it('opens it again where somebody’s last clinical role is taken away, and not before', async () => {
  const person = await makePerson(database, clinicId, ['therapist', 'on-call-clinician', 'billing']);
  const flagId = await claimedBy(person);
  const remove = (role: string) => desk.call('delete', `/api/people/${person.personId}/roles/${role}`);
  expect((await remove('on-call-clinician')).status).toBe(200);
  expect(await flagOf(flagId)).toEqual({ state: 'claimed', claimed_by: person.personId });
  expect((await remove('therapist')).status).toBe(200);
  expect(await flagOf(flagId)).toEqual({ state: 'open', claimed_by: null });
});
