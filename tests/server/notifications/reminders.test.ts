import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { deliver } from '#server/notifications/delivery.ts';
import { remindEverywhere } from '#server/notifications/reminders.ts';
import { makeClinic, makePatient, type TestPatient } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { plantCheckIn } from '../records.ts';
import { change, outsideWorld, rowsOf } from './outgoing.ts';

let database: TestDatabase;
let clinicId: string;
let patient: TestPatient;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(() => database.drop());

beforeEach(async () => {
  clinicId = await makeClinic(database);
  patient = await makePatient(database, clinicId, { today: '2026-12-01' });
});

// New York is five hours behind in December.
const remindAt = (instant: string) => remindEverywhere(database.pools.app, new Date(instant), silentLog);
const reminders = async () =>
  (await rowsOf(database, patient)).filter(({ kind }) => kind === 'check-in-reminder');
const setState = (state: string) =>
  database.asSuperuser.query('update patients set state = $2 where id = $1', [patient.patientId, state]);
const checkIn = (localDate: string, kind: 'daily' | 'something-new' = 'daily') =>
  plantCheckIn(database, patient, { at: new Date(`${localDate}T13:00:00Z`), kind });

describe('a reminder of the check-in', () => {
  it('comes once a local date, from ten o’clock on, whoever asks and however often', async () => {
    await remindAt('2026-12-01T14:59:59Z');
    expect(await reminders()).toEqual([]);
    await Promise.all([remindAt('2026-12-01T15:00:00Z'), remindAt('2026-12-01T15:00:00Z')]);
    await remindAt('2026-12-01T15:01:00Z');
    expect(await reminders()).toMatchObject([{ occasion: 'reminder:2026-12-01', channel: 'email' }]);
    await database.asSuperuser.query(`update notifications set state = 'sent'`);
    await remindAt('2026-12-02T15:00:00Z');
    expect(await reminders()).toHaveLength(2);
  });

  it('comes at the hour that was asked for, where the person is', async () => {
    await change(database, patient, { remind_at: '08:30', time_zone: 'America/Los_Angeles' });
    await remindAt('2026-12-01T16:29:00Z');
    expect(await reminders()).toEqual([]);
    await remindAt('2026-12-01T16:30:00Z');
    expect(await reminders()).toHaveLength(1);
  });

  it('does not come in the evening, unless it was asked for then', async () => {
    await remindAt('2026-12-02T01:00:00Z');
    expect(await reminders()).toEqual([]);
    await change(database, patient, { remind_at: '20:30' });
    await remindAt('2026-12-02T01:30:00Z');
    expect(await reminders()).toHaveLength(1);
  });

  it('does not come once the check-in is there; what somebody sent besides is none', async () => {
    await checkIn('2026-11-30');
    await checkIn('2026-12-01', 'something-new');
    await remindAt('2026-12-01T15:00:00Z');
    expect(await reminders()).toHaveLength(1);
    await database.asSuperuser.query(`update notifications set state = 'sent'`);
    await checkIn('2026-12-02');
    await remindAt('2026-12-02T15:00:00Z');
    expect(await reminders()).toHaveLength(1);
  });

  it.each(['paused', 'discharged', 'ended'])('comes to no patient who is %s', async (state) => {
    await setState(state);
    await remindAt('2026-12-01T15:00:00Z');
    expect(await reminders()).toEqual([]);
  });

  it('comes to a planned patient from the day of surgery on', async () => {
    await setState('planned');
    await database.asSuperuser.query(
      `update operation_cards set surgery_date = '2026-12-02' where patient_id = $1`,
      [patient.patientId],
    );
    await remindAt('2026-12-01T15:00:00Z');
    expect(await reminders()).toEqual([]);
    await remindAt('2026-12-02T15:00:00Z');
    expect(await reminders()).toHaveLength(1);
  });

  it.each<[string, () => Promise<unknown>, string]>([
    ['the patient was paused', () => setState('paused'), '2026-12-01T15:05:00Z'],
    ['the check-in has come', () => checkIn('2026-12-01'), '2026-12-01T15:05:00Z'],
    ['the day is over', async () => undefined, '2026-12-02T05:00:00Z'],
  ])('that still waits when %s is not sent', async (_what, happens, sentAt) => {
    await remindAt('2026-12-01T15:00:00Z');
    const [row] = await reminders();
    await happens();
    const world = outsideWorld(database);
    await deliver(world.tools, { clinicId, id: row!.id }, () => new Date(sentAt));
    expect(world.taken).toEqual([]);
    expect(await reminders()).toMatchObject([{ state: 'dropped' }]);
  });

  it('that still waits goes out, to the way to the check-in', async () => {
    await remindAt('2026-12-01T15:00:00Z');
    const [row] = await reminders();
    const world = outsideWorld(database);
    await deliver(world.tools, { clinicId, id: row!.id }, () => new Date('2026-12-01T15:00:01Z'));
    expect(world.taken).toMatchObject([{ path: '/check-in', email: patient.email }]);
  });
});
