import { describe, expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { patientMoves, patientStates, stateAfter } from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { patientScene } from './scene.ts';

const { scene, move } = patientScene();

const today = () => localDateIn('America/New_York', new Date());
const setState = (state: string, { patientId } = scene.patient) =>
  scene.database.asSuperuser.query('update patients set state = $1 where id = $2', [state, patientId]);

describe('moves of a patient', () => {
  const table = patientStates.flatMap((from) =>
    patientMoves.map((name) => ({ from, name, to: stateAfter(from, name) ?? null })),
  );

  it.each(table)('from $from by $name leads to $to', async ({ from, name, to }) => {
    // Before surgery a planned patient is one.
    if (from === 'planned') {
      await scene.database.asSuperuser.query(
        `update operation_cards set surgery_date = current_date + 30 where patient_id = $1`,
        [scene.patient.patientId],
      );
    }
    await setState(from);
    const answer = await move(name);
    expect(answer.status, answer.text).toBe(to === null ? 409 : 200);
    const { rows } = await scene.database.asSuperuser.query(
      `select p.state, (select count(*)::int from patient_state_changes c where c.patient_id = p.id) as changes
       from patients p where p.id = $1`,
      [scene.patient.patientId],
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
    const { rows } = await scene.database.asSuperuser.query<{ state: string; newest: string }>(
      `select p.state, (select to_state from patient_state_changes c where c.patient_id = p.id
         order by at desc, (to_state = 'discharged') desc limit 1) as newest from patients p where p.id = $1`,
      [scene.patient.patientId],
    );
    expect(rows[0]?.state).toBe(rows[0]?.newest);
    expect(answers.filter(({ status }) => status === 200).length).toBeGreaterThan(0);
  });

  it('keep who, when, why and until when', async () => {
    await move('pause', { backOn: today(), reason: 'In hospital.' });
    const record = (await scene.desk.call('get', `/api/patients/${scene.patient.patientId}`))
      .body as PatientRecord;
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
    const phone = await scene.web.signIn(scene.patient);
    const { ended } = await phone.socket();
    expect((await move('end')).status).toBe(200);
    await ended;
    expect((await phone.call('get', '/api/today')).status).toBe(401);
    await expect(scene.web.signIn(scene.patient)).rejects.toThrow('401');
  });

  it('leaves a therapist who was also a patient at work', async () => {
    await scene.database.asSuperuser.query(`insert into person_roles values ($1, $2, 'therapist')`, [
      scene.clinicId,
      scene.patient.personId,
    ]);
    expect((await move('end')).status).toBe(200);
    const theirs = await scene.web.signIn(scene.patient);
    expect((await theirs.call('get', '/api/flags')).status).toBe(200);
    expect((await theirs.call('get', '/api/today')).status).toBe(403);
  });
});
