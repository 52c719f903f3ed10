import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ActivityLine } from '#shared/caregivers/contract.ts';
import { activityCodes } from '#shared/caregivers/activity-codes.ts';
import { notShown, shownActions } from '#server/features/activity/words.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { actingFor, plantGrant } from '../caregivers/grants.ts';
import { plantFlag } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let ines: TestPatient;
let phone: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  await database.asSuperuser.query(`update people set credential = 'PT' where id = $1`, [noor.personId]);
  ines = await makePatient(database, clinicId, { lead: noor, name: 'Ines Valcourt' });
  phone = await web.signIn(ines);
});

type Page = { lines: ActivityLine[]; more: boolean };
const activity = async (query = '') => (await phone.call('get', `/api/activity${query}`)).body as Page;
const linesOf = async (query = '') =>
  (await activity(query)).lines.map(({ who, as, what, reason }) => ({ who, as, what, reason }));
const chart = () => `/api/patients/${ines.patientId}`;

describe('who opened my record', () => {
  it('names the care team with title, and gives no reason where none was needed', async () => {
    await (await web.signIn(noor)).call('get', chart());
    expect(await linesOf()).toEqual([
      { who: 'Noor Haddad, PT', as: 'care-team', what: 'opened-record', reason: null },
    ]);
  });

  it('tells of somebody outside the care team, and why in their own words', async () => {
    const callum = await web.signIn(await makePerson(database, clinicId, ['therapist'], 'Callum Reyes'));
    await callum.call('post', `${chart()}/openings`, { reason: 'You rang while Noor was away.' });
    await callum.call('get', chart());
    expect(await linesOf()).toEqual([
      { who: 'Callum Reyes', as: 'clinic', what: 'opened-record', reason: 'You rang while Noor was away.' },
      { who: 'Callum Reyes', as: 'clinic', what: 'gave-reason', reason: 'You rang while Noor was away.' },
    ]);
  });

  it('says that whoever looked at a flag from outside the team was covering', async () => {
    const { flagId } = await plantFlag(database, ines);
    const petra = await makePerson(database, clinicId, ['on-call-clinician'], 'Petra Lund');
    await (await web.signIn(petra)).call('get', `/api/flags/${flagId}`);
    await (await web.signIn(noor)).call('get', `/api/flags/${flagId}`);
    expect(await linesOf()).toEqual([
      { who: 'Noor Haddad, PT', as: 'care-team', what: 'opened-case', reason: null },
      { who: 'Petra Lund', as: 'clinic', what: 'opened-case', reason: 'covering' },
    ]);
  });

  it('tells what a caregiver did as what they are to the patient, and a therapist’s own care as care', async () => {
    const daughter = await makePerson(database, clinicId, ['therapist', 'caregiver'], 'Amara Valcourt');
    await plantGrant(database, ines, daughter, { relationship: 'daughter' });
    await (await web.signIn(daughter)).call('get', '/api/today', undefined, actingFor(ines));
    expect(await linesOf()).toEqual([
      { who: 'Amara Valcourt, daughter', as: 'caregiver', what: 'read-today', reason: null },
    ]);
  });

  it('leaves out what the patient did unless asked, and what others were refused', async () => {
    await phone.call('get', '/api/today');
    const callum = await web.signIn(await makePerson(database, clinicId, ['therapist']));
    expect((await callum.call('get', chart())).status).toBe(403);
    expect(await linesOf()).toEqual([]);
    expect(await linesOf('?others=false')).toEqual([
      { who: 'Ines Valcourt', as: 'you', what: 'read-today', reason: null },
    ]);
  });

  it('is the own record alone', async () => {
    const other = await makePatient(database, clinicId, { lead: noor });
    await (await web.signIn(noor)).call('get', `/api/patients/${other.patientId}`);
    expect(await linesOf()).toEqual([]);
  });
});

describe('a long record', () => {
  const plant = (at: string) =>
    database.asSuperuser.query(
      `insert into audit_entries (clinic_id, id, at, actor_kind, person_id, action, patient_id)
       values ($1, $2, $3, 'person', $4, 'patient.changed', $5)`,
      [clinicId, randomUUID(), at, noor.personId, ines.patientId],
    );
  const minute = (index: number) => new Date(Date.UTC(2026, 0, 1, 0, index)).toISOString();

  it('comes newest first, fifty at a time, and no entry is lost or doubled between two pages', async () => {
    for (let index = 0; index < 60; index += 1) await plant(minute(index));
    // Three at the very instant at which the first page ends.
    await plant(minute(10));
    await plant(minute(10));
    const first = await activity();
    expect(first.more).toBe(true);
    expect(first.lines).toHaveLength(52);
    const last = first.lines.at(-1)!.at;
    const second = await activity(`?before=${encodeURIComponent(last)}`);
    expect(second.more).toBe(false);
    const all = [...first.lines, ...second.lines];
    expect(new Set(all.map(({ id }) => id)).size).toBe(62);
    expect(all.map(({ at }) => at)).toEqual(
      all
        .map(({ at }) => at)
        .toSorted()
        .reverse(),
    );
  });
});

describe('the words of the activity', () => {
  it('have a code for every action that is shown, and every code is of some action', () => {
    const used = Object.values(shownActions).map(({ code }) => code);
    expect([...new Set(used)].sort()).toEqual([...activityCodes].sort());
  });

  it('give a reason for every action that is not shown, and none is both', () => {
    for (const [action, reason] of Object.entries(notShown)) {
      expect(reason).toMatch(/^[A-Z].+\.$/u);
      expect(shownActions[action]).toBeUndefined();
    }
  });
});
