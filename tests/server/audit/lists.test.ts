import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let administrator: TestPerson;
let office: TestBrowser;
// The beginning of a window of five minutes.
const start = new Date('2026-12-01T15:00:00Z');
let now = start;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
  administrator = await makePerson(database, clinicId, ['administrator']);
  office = await web.signIn(administrator);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const entriesOf = async (action: string) => {
  const { rows } = await database.asSuperuser.query<{ personId: string; detail: unknown }>(
    `select person_id as "personId", detail from audit_entries
     where action = $1 and clinic_id = $2 and subject_id = $2 order by at, detail::text`,
    [action, clinicId],
  );
  return rows;
};
const after = (minutes: number) => {
  now = new Date(start.getTime() + minutes * 60_000);
};

it.each([
  ['/api/patients', 'patients.listed'],
  ['/api/people', 'people.listed'],
  ['/api/two-person-acts', 'two-person-acts.listed'],
  ['/api/deliveries', 'deliveries.listed'],
])('keeps one entry of %s for five minutes, however often the screen fetches it', async (path, action) => {
  after(0);
  for (const minute of [0, 1, 4]) {
    after(minute);
    expect((await office.call('get', path)).status).toBe(200);
  }
  expect((await entriesOf(action)).map(({ personId }) => personId)).toEqual([administrator.personId]);
  after(5);
  expect((await office.call('get', path)).status).toBe(200);
  expect(await entriesOf(action)).toHaveLength(2);
});

it('keeps an entry of its own for each list that was shown, and for each person', async () => {
  after(10);
  const colleague = await web.signIn(await makePerson(database, clinicId, ['administrator']));
  const before = (await entriesOf('patients.listed')).length;
  for (const browser of [office, colleague, office]) {
    for (const filter of ['paused', 'all']) {
      expect((await browser.call('get', `/api/patients?filter=${filter}`)).status).toBe(200);
    }
  }
  const entries = (await entriesOf('patients.listed')).slice(before);
  expect(entries.map(({ detail }) => detail)).toEqual([
    { filter: 'all' },
    { filter: 'all' },
    { filter: 'paused' },
    { filter: 'paused' },
  ]);
  expect(new Set(entries.map(({ personId }) => personId)).size).toBe(2);
});
