import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { evaluateAlertTask } from '#workers/tasks/evaluate-alert.ts';
import { evaluateCheckInTask } from '#workers/tasks/evaluate-check-in.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { plantAlert, plantCheckIn } from '../records.ts';

let database: TestDatabase;
let clinicId: string;
let lead: TestPerson;
let onCall: TestPerson;
let patient: TestPatient;

beforeAll(async () => {
  database = await cloneDatabase();
  clinicId = await makeClinic(database);
  lead = await makePerson(database, clinicId, ['therapist']);
  onCall = await makePerson(database, clinicId, ['on-call-clinician']);
});

afterAll(async () => {
  await database.drop();
});

beforeEach(async () => {
  patient = await makePatient(database, clinicId, { lead });
});

const later = () => new Date(Date.now() + 11_000);
const sweep = () => sweepUnevaluated(database.pools.app, later(), silentLog);
const evaluate = (checkInId: string) =>
  evaluateCheckInTask(database.pools, { clinicId, checkInId }, new Date());

const outcome = async () => {
  const { rows } = await database.asSuperuser.query<Record<string, number>>(
    `select count(*)::int as flags,
       coalesce(sum((select count(*) from flag_events e where e.flag_id = f.id and e.kind = 'raised')), 0)::int as raised,
       coalesce(sum((select count(*) from audit_entries a where a.subject_id = f.id and a.action = 'flag.raised')), 0)::int as audited,
       coalesce(sum((select count(*) from notifications n where n.occasion like 'flag:' || f.id || ':%' and n.person_id = $2)), 0)::int as lead_told,
       coalesce(sum((select count(*) from notifications n where n.occasion like 'flag:' || f.id || ':%' and n.person_id = $3)), 0)::int as on_call_told
     from flags f where f.patient_id = $1`,
    [patient.patientId, lead.personId, onCall.personId],
  );
  return rows[0];
};
const once = { flags: 1, raised: 1, audited: 1, lead_told: 1 };

/** Refusals that make a queue run a task again, as it may: the row was busy for longer than a lock may wait. */
const onlyBusy = (results: PromiseSettledResult<unknown>[]) => {
  const failures = results.flatMap((result) =>
    result.status === 'rejected' ? [result.reason as Error] : [],
  );
  for (const { cause } of failures) expect(cause).toMatchObject({ code: '55P03' });
  expect(failures.length).toBeLessThan(results.length);
};

describe('an evaluation', () => {
  it('raises one flag, says so once and tells each person once, however often and at once it runs', async () => {
    const { id } = await plantCheckIn(database, patient, {
      evaluated: false,
      answers: { symptoms: ['fall'], fallSigns: ['cannot-stand'] },
    });
    onlyBusy(
      await Promise.allSettled(Array.from({ length: 20 }, (_, i) => (i % 2 === 0 ? evaluate(id) : sweep()))),
    );
    expect(await outcome()).toEqual({ ...once, on_call_told: 1 });
    await evaluate(id);
    await sweep();
    expect(await outcome()).toEqual({ ...once, on_call_told: 1 });
  });

  it('raises one flag for an alert and its check-in evaluated at the same moment', async () => {
    const checkInClientId = randomUUID();
    const answers = { danger: ['bleeding' as const] };
    const alert = await plantAlert(database, patient, { evaluated: false, checkInClientId, answers });
    const { id } = await plantCheckIn(database, patient, {
      evaluated: false,
      clientId: checkInClientId,
      answers,
    });
    const tasks = Array.from({ length: 20 }, (_, i) =>
      i % 2 === 0
        ? evaluate(id)
        : evaluateAlertTask(database.pools, { clinicId, alertId: alert.id }, new Date()),
    );
    onlyBusy(await Promise.allSettled(tasks));
    expect(await outcome()).toEqual({ ...once, on_call_told: 1 });
  });

  it('tells the care team only of what is for the same day', async () => {
    await plantCheckIn(database, patient, { evaluated: false, answers: { symptoms: ['fall'] } });
    await sweep();
    expect(await outcome()).toEqual({ ...once, on_call_told: 0 });
  });

  it('raises nothing when all is well, and is done with it', async () => {
    const { id } = await plantCheckIn(database, patient, { evaluated: false });
    await evaluate(id);
    expect(await outcome()).toMatchObject({ flags: 0 });
    const { rows } = await database.asSuperuser.query(
      'select evaluated_at is not null as done from check_ins where id = $1',
      [id],
    );
    expect(rows).toEqual([{ done: true }]);
  });

  it('is quiet about a check-in that is not there, or is of another clinic', async () => {
    await expect(evaluate(randomUUID())).resolves.toBeUndefined();
    const elsewhere = await makePatient(database, await makeClinic(database));
    const { id } = await plantCheckIn(database, elsewhere, {
      evaluated: false,
      answers: { danger: ['bleeding'] },
    });
    await evaluate(id);
    const { rowCount } = await database.asSuperuser.query('select from flags where patient_id = $1', [
      elsewhere.patientId,
    ]);
    expect(rowCount).toBe(0);
    await sweep();
  });
});

describe('the usual of a person', () => {
  it('is the mean of the last three before the answers, whatever came later', async () => {
    const hoursAgo = (hours: number) => new Date(Date.now() - hours * 3_600_000);
    for (const [hours, painNow] of [
      [96, 9],
      [72, 2],
      [48, 3],
      [24, 4],
    ] as const) {
      await plantCheckIn(database, patient, { at: hoursAgo(hours), answers: { painNow } });
    }
    await plantCheckIn(database, patient, { at: new Date(), answers: { painNow: 10 } });
    const { id } = await plantCheckIn(database, patient, {
      at: hoursAgo(1),
      answers: { painNow: 5 },
      evaluated: false,
    });
    await evaluate(id);
    const { rows } = await database.asSuperuser.query<{ code: string; usual: number }>(
      `select code, (values ->> 'usual')::float as usual from findings f join flags g on g.id = f.flag_id where g.patient_id = $1`,
      [patient.patientId],
    );
    // Pain 5 is exactly 2 above the mean of 2, 3 and 4: at the threshold of pain-rise (domain, section 4).
    expect(rows).toEqual([{ code: 'pain-rise', usual: 3 }]);
  });
});

describe('the sweep', () => {
  it('leaves to the worker what is younger than ten seconds', async () => {
    await plantCheckIn(database, patient, { evaluated: false, answers: { symptoms: ['fall'] } });
    await sweepUnevaluated(database.pools.app, new Date(Date.now() + 9000), silentLog);
    expect(await outcome()).toMatchObject({ flags: 0 });
    await sweep();
    expect(await outcome()).toMatchObject({ flags: 1 });
  });

  it('serves every clinic, each inside its own fence', async () => {
    const elsewhere = await makePatient(database, await makeClinic(database));
    await plantCheckIn(database, elsewhere, { evaluated: false, answers: { symptoms: ['fall'] } });
    await plantAlert(database, patient, { evaluated: false });
    expect(await sweep()).toBe(2);
  });

  it('is not kept from the others by one that cannot be evaluated', async () => {
    const broken = await makePatient(database, clinicId);
    await database.asSuperuser.query('delete from plans where patient_id = $1', [broken.patientId]);
    const { id } = await plantCheckIn(database, broken, {
      evaluated: false,
      at: new Date(Date.now() - 60_000),
    });
    await plantCheckIn(database, patient, { evaluated: false, answers: { symptoms: ['fall'] } });
    expect(await sweep()).toBe(1);
    expect(await outcome()).toMatchObject({ flags: 1 });
    const { rows } = await database.asSuperuser.query('select evaluated_at from check_ins where id = $1', [
      id,
    ]);
    expect(rows).toEqual([{ evaluated_at: null }]);
  });
});
