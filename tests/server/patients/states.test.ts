import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { patientMoves, patientStates, stateAfter } from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;
let patient: TestPatient;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  desk = await web.signIn(noor);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  patient = await makePatient(database, clinicId, { lead: noor });
});

const today = () => localDateIn('America/New_York', new Date());
const move = (name: string, changes: Record<string, unknown> = {}, { patientId } = patient) =>
  desk.call('post', `/api/patients/${patientId}/moves`, {
    move: name,
    reason: 'Said on the phone.',
    ...changes,
  });
const setState = (state: string, { patientId } = patient) =>
  database.asSuperuser.query('update patients set state = $1 where id = $2', [state, patientId]);

describe('moves of a patient', () => {
  const table = patientStates.flatMap((from) =>
    patientMoves.map((name) => ({ from, name, to: stateAfter(from, name) ?? null })),
  );

  it.each(table)('from $from by $name leads to $to', async ({ from, name, to }) => {
    // Before surgery a planned patient is one.
    if (from === 'planned') {
      await database.asSuperuser.query(
        `update operation_cards set surgery_date = current_date + 30 where patient_id = $1`,
        [patient.patientId],
      );
    }
    await setState(from);
    const answer = await move(name);
    expect(answer.status, answer.text).toBe(to === null ? 409 : 200);
    const { rows } = await database.asSuperuser.query(
      `select p.state, (select count(*)::int from patient_state_changes c where c.patient_id = p.id) as changes
       from patients p where p.id = $1`,
      [patient.patientId],
    );
    expect(rows).toEqual([{ state: to ?? from, changes: to === null ? 0 : 1 }]);
  });

  it('treat a planned patient from the day of surgery on as an active one', async () => {
    await setState('planned');
    expect((await move('pause')).body).toMatchObject({ state: 'paused' });
  });

  it('happen once when two colleagues move at the same moment', async () => {
    const answers = await Promise.all([move('pause'), move('discharge')]);
    // Whichever comes second either finds the other state, or loses the race; both leave one state and its changes.
    const { rows } = await database.asSuperuser.query<{ state: string; newest: string }>(
      `select p.state, (select to_state from patient_state_changes c where c.patient_id = p.id
         order by at desc, (to_state = 'discharged') desc limit 1) as newest from patients p where p.id = $1`,
      [patient.patientId],
    );
    expect(rows[0]?.state).toBe(rows[0]?.newest);
    expect(answers.filter(({ status }) => status === 200).length).toBeGreaterThan(0);
  });

  it('keep who, when, why and until when', async () => {
    await move('pause', { backOn: today(), reason: 'In hospital.' });
    const record = (await desk.call('get', `/api/patients/${patient.patientId}`)).body as PatientRecord;
    expect(record).toMatchObject({ state: 'paused', backOn: today() });
    expect(record.changes).toMatchObject([
      { from: 'active', to: 'paused', reason: 'In hospital.', backOn: today(), by: 'Noor Haddad' },
    ]);
  });

  it.each([
    ['pause', '2020-01-01'],
    ['discharge', '2099-01-01'],
  ])('refuse a day of return that makes no sense: %s, %s', async (name, backOn) => {
    const answer = await move(name, { backOn });
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ errors: [{ field: 'backOn' }] });
  });
});

describe('a record that has ended', () => {
  it('signs the patient out everywhere, sockets too, and lets nobody in again', async () => {
    const phone = await web.signIn(patient);
    const { ended } = await phone.socket();
    expect((await move('end')).status).toBe(200);
    await ended;
    expect((await phone.call('get', '/api/today')).status).toBe(401);
    await expect(web.signIn(patient)).rejects.toThrow('401');
  });

  it('leaves a therapist who was also a patient at work', async () => {
    await database.asSuperuser.query(`insert into person_roles values ($1, $2, 'therapist')`, [
      clinicId,
      patient.personId,
    ]);
    expect((await move('end')).status).toBe(200);
    const theirs = await web.signIn(patient);
    expect((await theirs.call('get', '/api/flags')).status).toBe(200);
    expect((await theirs.call('get', '/api/today')).status).toBe(403);
  });
});
