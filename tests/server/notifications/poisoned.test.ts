import { afterAll, beforeAll, expect, it } from 'vitest';
import { createSender } from '#server/notifications/sender.ts';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { outsideWorld, rowsOf, tell } from './outgoing.ts';

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(() => database.drop());

it('sends what stands behind a notification that cannot even be read', async () => {
  const clinicId = await makeClinic(database);
  const now = new Date('2026-12-01T15:00:00Z');
  const patient = await makePatient(database, clinicId, { today: '2026-12-01' });
  const noor = await makePerson(database, clinicId, ['therapist']);
  const reminder = { kind: 'check-in-reminder', occasion: 'reminder:2026-12-01' } as const;
  await tell(database, patient, reminder, new Date(now.getTime() - 60_000));
  // A zone that the server once knew and no longer does.
  await database.asSuperuser.query(`update patients set time_zone = 'Nowhere/Gone' where id = $1`, [
    patient.patientId,
  ]);
  await tell(database, noor, { kind: 'new-message' }, now);
  const { tools } = outsideWorld(database);
  const sender = createSender(tools, { clock: () => now, log: silentLog, atOnce: 1 });
  sender.wake();
  await sender.idle();
  expect(await rowsOf(database, noor)).toMatchObject([{ state: 'sent' }]);
  expect(await rowsOf(database, patient)).toMatchObject([{ state: 'pending' }]);
});
