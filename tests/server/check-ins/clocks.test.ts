import { afterAll, beforeAll, expect, it } from 'vitest';
import type { CheckInReceipt, PostCheckIn } from '#shared/check-ins/contract.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import type { MorningRound } from '#shared/triage/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { plantCheckIn } from '../records.ts';
import { checkInBody } from './bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

/** Pain 8 where 2 is usual, sent by a phone with such a clock. */
const riseOfPain = async (clock: Partial<PostCheckIn>) => {
  const patient = await makePatient(database, clinicId, { lead: noor });
  await plantCheckIn(database, patient, {
    answers: { painNow: 2 },
    at: new Date(Date.now() - 86_400_000),
  });
  const phone = await web.signIn(patient);
  const sent = await phone.call('post', '/api/check-ins', checkInBody({ answers: { painNow: 6 }, ...clock }));
  expect(sent.status, sent.text).toBe(201);
  await sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);
  const desk = await web.signIn(noor);
  const { flags } = (await desk.call('get', '/api/flags')).body as MorningRound;
  const flag = flags.find((one) => one.patient.id === patient.patientId);
  return { receipt: sent.body as CheckInReceipt, headline: flag?.headline };
};

const today = () => localDateIn('America/New_York', new Date());
const rise = 'Pain 6, up 4 on the mean of the last 3';

it.each([
  ['years behind', { answeredAt: '2016-03-01T08:00:00.000Z', sentAt: '2016-03-01T08:01:00.000Z' }],
  ['a day ahead', { answeredAt: '2099-01-01T08:00:00.000Z', sentAt: '2099-01-01T08:01:00.000Z' }],
  ['right at sending and years behind at answering', { answeredAt: '2020-01-01T08:00:00.000Z' }],
  ['in a year that no calendar has', { answeredAt: '0000-01-01T08:00:00.000Z' }],
])('a clock that is %s is marked, dated by the server, and hides no rise of pain', async (_which, clock) => {
  const { receipt, headline } = await riseOfPain(clock);
  expect(receipt).toMatchObject({ clockDoubtful: true, localDate: today() });
  expect(headline).toBe(rise);
});

it('a right clock is taken at its word', async () => {
  const { receipt, headline } = await riseOfPain({});
  expect(receipt).toMatchObject({ clockDoubtful: false, localDate: today() });
  expect(headline).toBe(rise);
});
