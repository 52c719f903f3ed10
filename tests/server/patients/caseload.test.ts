import { describe, expect, it } from 'vitest';
import type { PatientLine } from '#shared/patients/contract.ts';
import type { Role } from '#shared/access/permissions.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { startWeb, type TestBrowser } from '#tests/support/web.ts';
import { plantCheckIn } from '../records.ts';
import { patientScene } from './scene.ts';

const { scene } = patientScene();

const today = () => localDateIn('America/New_York', new Date());

describe('the list', () => {
  const listed = async (query = '', who = scene.desk) =>
    (await who.call('get', `/api/patients${query}`)).body as {
      patients: PatientLine[];
      neverStarted: number;
    };

  it('is in the order in which people sort names', async () => {
    const here = await makeClinic(scene.database);
    const lead = await makePerson(scene.database, here, ['therapist']);
    for (const name of ['Zoë Zapata', 'ana Álvarez', 'Émile Grand', 'Eva Gray']) {
      await makePatient(scene.database, here, { lead, name });
    }
    const names = (await listed('', await scene.web.signIn(lead))).patients.map(({ name }) => name);
    expect(names).toEqual(['ana Álvarez', 'Émile Grand', 'Eva Gray', 'Zoë Zapata']);
  });

  it('counts as never started who is active, a day or more after surgery, and has sent nothing', async () => {
    const here = await makeClinic(scene.database);
    const lead = await makePerson(scene.database, here, ['therapist']);
    const make = (day: number, state = 'active') =>
      makePatient(scene.database, here, { lead, day, today: today(), patient: { state: state as 'active' } });
    const silent = await make(1);
    const movedOn = await make(1, 'planned');
    await make(0);
    await make(9, 'paused');
    await make(9, 'discharged');
    await plantCheckIn(scene.database, await make(9));
    const found = await listed('?filter=never-started', await scene.web.signIn(lead));
    expect(found.neverStarted).toBe(2);
    expect(found.patients.map(({ id }) => id).sort()).toEqual([silent.patientId, movedOn.patientId].sort());
  });
});

describe('a chart outside the care team', () => {
  const signInAs = async (role: Role) =>
    scene.web.signIn(await makePerson(scene.database, scene.clinicId, [role]));

  it('opens after a reason was given, for whoever gave it', async () => {
    const callum = await signInAs('therapist');
    const path = `/api/patients/${scene.patient.patientId}`;
    expect((await callum.call('get', path)).body).toMatchObject({
      type: 'urn:espalier:problem:reason-needed',
    });
    expect((await callum.call('post', `${path}/openings`, { reason: '  ' })).status).toBe(422);
    expect((await callum.call('post', `${path}/openings`, { reason: 'Covering for Noor.' })).status).toBe(
      204,
    );
    expect((await callum.call('get', path)).status).toBe(200);
    expect((await (await signInAs('clinical-lead')).call('get', path)).status).toBe(403);
  });

  it('asks anew after twelve hours', async () => {
    const start = new Date();
    let now = start;
    const moved = await startWeb(scene.database, { clock: () => now });
    const person = await makePerson(scene.database, scene.clinicId, ['therapist']);
    const path = `/api/patients/${scene.patient.patientId}`;
    await (await moved.signIn(person)).call('post', `${path}/openings`, { reason: 'Covering for Noor.' });
    const after = async (minutes: number) => {
      now = new Date(start.getTime() + minutes * 60_000);
      return (await (await moved.signIn(person)).call('get', path)).status;
    };
    expect(await after(12 * 60 - 1)).toBe(200);
    expect(await after(12 * 60)).toBe(403);
    await moved.stop();
  });

  it('keeps the reason where the patient reads it, and out of the audit', async () => {
    const callum = await signInAs('therapist');
    await callum.call('post', `/api/patients/${scene.patient.patientId}/openings`, {
      reason: 'Rang about a fall.',
    });
    const { rows } = await scene.database.asSuperuser.query(
      `select a.detail, o.reason from audit_entries a join chart_openings o on o.id = a.subject_id
       where a.action = 'chart.opened-outside-team' and a.patient_id = $1`,
      [scene.patient.patientId],
    );
    expect(rows).toEqual([{ detail: null, reason: 'Rang about a fall.' }]);
  });
});

describe('a new invitation', () => {
  const invite = (who: TestBrowser, { patientId } = scene.patient) =>
    who.call('post', `/api/patients/${patientId}/invitations`, { byEmail: false });

  it('comes from an administrator too, who opens no chart', async () => {
    await scene.database.asSuperuser.query('delete from credentials where person_id = $1', [
      scene.patient.personId,
    ]);
    const office = await scene.web.signIn(
      await makePerson(scene.database, scene.clinicId, ['administrator']),
    );
    expect((await invite(office)).status).toBe(201);
    expect((await office.call('get', `/api/patients/${scene.patient.patientId}`)).status).toBe(403);
  });

  it('is not to be had for somebody who can sign in: it would open their account', async () => {
    expect((await invite(scene.desk)).status).toBe(409);
  });
});
