import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Today } from '#shared/plans/contract.ts';
import type { FlagCase, MorningRound } from '#shared/triage/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { alertBody, checkInBody } from '../check-ins/bodies.ts';
import { plantCheckIn, plantFlag, markTold } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;
// Noon in New York, so that a few hours to and fro stay on one date there.
let now = new Date('2026-03-10T16:00:00Z');
const today = '2026-03-10';

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = new Date('2026-03-10T16:00:00Z');
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  desk = await web.signIn(noor);
});

const patientOnDay = (day = 24) => makePatient(database, clinicId, { lead: noor, day, today });
const minutesAgo = (minutes: number) => new Date(now.getTime() - minutes * 60_000);
const round = async () => (await desk.call('get', '/api/flags')).body as MorningRound;
const sweep = async () => {
  now = new Date(now.getTime() + 11_000);
  await sweepUnevaluated(database.pools.app, now, silentLog);
};
const send = async (phone: TestBrowser, path: string, body: object) => {
  const at = now.toISOString();
  const answer = await phone.call('post', path, { ...body, answeredAt: at, sentAt: at });
  expect(answer.status, answer.text).toBe(201);
};

describe('the morning round', () => {
  it('stands in order of urgency, then of age, whoever has claimed what', async () => {
    const patient = await patientOnDay();
    const expected: string[] = [];
    const plan = [
      ['emergency', 5],
      ['emergency', 1],
      ['urgent', 300],
      ['urgent', 2],
      ['same-day', 900],
      ['same-day', 10],
      ['routine', 1000],
    ] as const;
    // Planted the other way round, so that the order of writing is not the order shown.
    for (const [urgency, minutes] of plan.toReversed()) {
      const claimed = minutes === 300 ? { claimedBy: noor } : {};
      const raisedAt = minutesAgo(minutes);
      expected.unshift((await plantFlag(database, patient, { urgency, raisedAt, ...claimed })).flagId);
    }
    await plantFlag(database, patient, { urgency: 'emergency', state: 'closed' });
    const { flags, date } = await round();
    expect(date).toBe(today);
    expect(flags.map(({ id }) => id)).toEqual(expected);
  });

  it('counts as quiet who checked in today with nothing flagged, each person once', async () => {
    const [calm, alsoCalm, flagged, yesterday] = [
      await patientOnDay(),
      await patientOnDay(),
      await patientOnDay(),
      await patientOnDay(),
    ];
    await plantCheckIn(database, calm, { at: minutesAgo(60) });
    await plantCheckIn(database, calm, { at: minutesAgo(30), kind: 'something-new' });
    await plantCheckIn(database, alsoCalm, { at: minutesAgo(20) });
    await plantCheckIn(database, flagged, { at: minutesAgo(90) });
    await plantFlag(database, flagged, { raisedAt: minutesAgo(10) });
    await plantCheckIn(database, yesterday, { at: minutesAgo(24 * 60) });
    expect((await round()).quiet).toBe(2);
  });

  it('shows pain of fourteen days with gaps, and the usual of the days before the flag', async () => {
    const patient = await patientOnDay();
    for (const [days, painNow] of [
      [13, 6],
      [3, 2],
      [2, 3],
      [1, 4],
    ] as const) {
      await plantCheckIn(database, patient, { at: minutesAgo(days * 24 * 60), answers: { painNow } });
    }
    await plantFlag(database, patient, {
      raisedAt: minutesAgo(5),
      answers: { painNow: 8, symptoms: ['fall'] },
    });
    const [row] = (await round()).flags;
    expect(row).toMatchObject({
      pain14: [6, null, null, null, null, null, null, null, null, null, 2, 3, 4, 8],
      usualPain: 3,
      patient: { day: 24, arm: 'left', procedure: 'reverse-replacement' },
    });
  });
});

describe('a case', () => {
  it('says why in words with the values and the source, and shows the answer beside the usual', async () => {
    const patient = await patientOnDay();
    const phone = await web.signIn(patient);
    for (const days of [3, 2, 1]) {
      await plantCheckIn(database, patient, {
        at: minutesAgo(days * 24 * 60),
        answers: { painNow: 2, painWorst: 4 },
      });
    }
    await send(
      phone,
      '/api/check-ins',
      checkInBody({ answers: { painNow: 8, painWorst: 9, symptoms: ['fall'], note: ' On the stairs. ' } }),
    );
    await sweep();
    const [row] = (await round()).flags;
    const flag = (await desk.call('get', `/api/flags/${row!.id}`)).body as FlagCase;
    expect(flag.reasons.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['fall-with-injury', 'pain-severe', 'pain-rise']),
    );
    for (const reason of flag.reasons) {
      expect(reason.sentence).not.toBe('');
      expect(reason.source).not.toBe('');
      expect(reason.ruleVersion).toBeGreaterThan(0);
    }
    expect(flag.beside[0]).toMatchObject({ label: 'Pain now', today: '8', usual: '2' });
    expect(flag.note).toBe('On the stairs.');
    expect(flag.person).toMatchObject({ bloodThinner: 'none', phone: '555-0123', age: 69 });
    expect(flag.inForce.length).toBeGreaterThan(0);
  });

  it("shows the patient's earlier flags under the newest", async () => {
    const patient = await patientOnDay();
    const { flagId: old } = await plantFlag(database, patient, {
      state: 'closed',
      raisedAt: minutesAgo(5000),
    });
    const { flagId } = await plantFlag(database, patient);
    const flag = (await desk.call('get', `/api/flags/${flagId}`)).body as FlagCase;
    expect(flag.earlier).toMatchObject([{ id: old, state: 'closed' }]);
  });
});

describe('a flag that was closed after the tick alone', () => {
  const closeAfterTick = async () => {
    const patient = await patientOnDay();
    const phone = await web.signIn(patient);
    const checkInId = randomUUID();
    await send(phone, '/api/alerts', alertBody({ checkInId }));
    await sweep();
    const [row] = (await round()).flags;
    const closed = await desk.call('post', `/api/flags/${row!.id}/close`, {
      outcome: 'advised-by-phone',
      worthRaising: 'yes',
    });
    expect(closed.status).toBe(200);
    return { phone, checkInId, flagId: row!.id };
  };

  it('is open again when its finished check-in brings a new finding, and nobody holds it', async () => {
    const { phone, checkInId, flagId } = await closeAfterTick();
    await markTold(database);
    await send(
      phone,
      '/api/check-ins',
      checkInBody({ id: checkInId, answers: { danger: ['bleeding'], symptoms: ['fall'], painNow: 8 } }),
    );
    await sweep();
    const { flags } = await round();
    expect(flags).toMatchObject([{ id: flagId, state: 'open', claimedBy: null, urgency: 'emergency' }]);
    const flag = (await desk.call('get', `/api/flags/${flagId}`)).body as FlagCase;
    expect(flag.events.map(({ kind }) => kind)).toEqual(['raised', 'closed', 'raised-again']);
    expect(flag.outcome).toBeNull();
    const { rows } = await database.asSuperuser.query(
      `select 1 from notifications where person_id = $1 and occasion like 'flag:' || $2 || ':%'`,
      [noor.personId, flagId],
    );
    expect(rows.length).toBeGreaterThan(1);
  });

  it('stays closed when the check-in finds nothing that was not known', async () => {
    const { phone, checkInId } = await closeAfterTick();
    await send(phone, '/api/check-ins', checkInBody({ id: checkInId, answers: { danger: ['bleeding'] } }));
    await sweep();
    expect((await round()).flags).toEqual([]);
  });
});

describe("the patient's Today", () => {
  it('tells who has read the flag and who has it, and pauses the exercises until it is closed', async () => {
    const patient = await patientOnDay();
    const phone = await web.signIn(patient);
    const mine = async () => (await phone.call('get', '/api/today')).body as Today;
    expect(await mine()).toMatchObject({ paused: null, openFlag: null });
    await send(phone, '/api/check-ins', checkInBody({ answers: { symptoms: ['changed-shape'] } }));
    await sweep();
    expect(await mine()).toMatchObject({ paused: 'all', openFlag: { seenBy: null, claimedBy: null } });
    const [row] = (await round()).flags;
    await desk.call('post', `/api/flags/${row!.id}/claim`);
    expect(await mine()).toMatchObject({ openFlag: { seenBy: 'Noor Haddad', claimedBy: 'Noor Haddad' } });
    await desk.call('post', `/api/flags/${row!.id}/close`, {
      outcome: 'visit-brought-forward',
      worthRaising: 'yes',
    });
    expect(await mine()).toMatchObject({ paused: null, openFlag: null });
  });
});
