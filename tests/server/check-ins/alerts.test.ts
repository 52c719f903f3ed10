import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { AlertReceipt } from '#shared/check-ins/contract.ts';
import { makePatient, makePerson } from '#tests/support/clinic.ts';
import { plantAlert } from '../records.ts';
import { markTold } from '../records.ts';
import { alertScene } from './alert-scene.ts';

const { scene, sweep, flagsOfPatient, caseOf, send, finish } = alertScene();

describe('an alert at the tick and its finished check-in', () => {
  it('are one flag with the findings of both and the highest urgency', async () => {
    const { checkInId } = await send({ answers: { symptoms: ['fall'], fallSigns: ['hurts-more'] } });
    await sweep();
    expect(await flagsOfPatient()).toMatchObject([{ urgency: 'urgent' }]);

    await finish(checkInId, {
      answers: { symptoms: ['fall'], fallSigns: ['hurts-more'], danger: ['bleeding'], painNow: 7 },
    });
    await sweep();
    const flags = await flagsOfPatient();
    expect(flags).toMatchObject([{ urgency: 'emergency' }]);
    const { reasons, events } = await caseOf(flags[0]!.id);
    expect(reasons.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['bleeding', 'fall-with-injury', 'pain-severe']),
    );
    expect(reasons[0]?.code).toBe('bleeding');
    expect(events.map(({ kind }) => kind)).toEqual(['raised', 'raised-again']);
  });

  it('are one flag in whatever order they are evaluated, and nothing in the later lowers it', async () => {
    const { checkInId } = await send();
    await finish(checkInId, { answers: { painNow: 2, dangerNone: true } });
    await sweep();
    expect(await flagsOfPatient()).toMatchObject([{ urgency: 'emergency' }]);
  });

  it('are one flag when two ticks follow each other, with both reasons', async () => {
    const { checkInId } = await send();
    await send({ checkInId, answers: { danger: ['bleeding', 'cold-hand'] } });
    await sweep();
    const flags = await flagsOfPatient();
    expect(flags).toHaveLength(1);
    const { reasons } = await caseOf(flags[0]!.id);
    expect(reasons.map(({ code }) => code).sort()).toEqual(['bleeding', 'circulation']);
  });

  it('tell the people who answer for the patient again of a new emergency finding', async () => {
    const { checkInId } = await send();
    await sweep();
    await markTold(scene.database);
    await finish(checkInId, { answers: { danger: ['bleeding', 'cold-hand'] } });
    await sweep();
    const { rows } = await scene.database.asSuperuser.query<{ occasion: string }>(
      `select n.occasion from notifications n join flags f on n.occasion like 'flag:' || f.id || ':%'
       where f.patient_id = $1 and n.person_id = $2`,
      [scene.patient.patientId, scene.noor.personId],
    );
    expect(rows.map(({ occasion }) => occasion.split(':')[2]).sort()).toEqual(['alert', 'check-in']);
  });
});

describe('a tick by mistake', () => {
  it('is a new record: the alert and its flag stay, and the clinician reads of it', async () => {
    const { id } = await send();
    await sweep();
    const body = { id: randomUUID(), answeredAt: new Date().toISOString() };
    const said = await scene.phone.call('post', `/api/alerts/${id}/mistakes`, body);
    expect(said.status).toBe(201);
    const again = await scene.phone.call('post', `/api/alerts/${id}/mistakes`, body);
    expect([again.status, again.body]).toEqual([201, said.body]);
    const flags = await flagsOfPatient();
    expect(flags).toMatchObject([{ state: 'open', urgency: 'emergency' }]);
    const { events } = await caseOf(flags[0]!.id);
    expect(events.map(({ kind }) => kind)).toEqual(['raised', 'ticked-by-mistake']);
  });

  it('is on the record also when it is said before the alert was evaluated', async () => {
    const { id } = await send();
    await scene.phone.call('post', `/api/alerts/${id}/mistakes`, {
      id: randomUUID(),
      answeredAt: new Date().toISOString(),
    });
    await sweep();
    const flags = await flagsOfPatient();
    expect(flags).toHaveLength(1);
    const { events } = await caseOf(flags[0]!.id);
    expect(events.map(({ kind }) => kind)).toEqual(['raised', 'ticked-by-mistake']);
  });

  it('names one alert: the same id about another is a conflict', async () => {
    const [one, other] = [await send(), await send()];
    const body = { id: randomUUID(), answeredAt: new Date().toISOString() };
    expect((await scene.phone.call('post', `/api/alerts/${one.id}/mistakes`, body)).status).toBe(201);
    expect((await scene.phone.call('post', `/api/alerts/${other.id}/mistakes`, body)).status).toBe(409);
  });
});

describe('what the patient is told of an alert', () => {
  const receiptOf = async (id: string) =>
    (await scene.phone.call('get', `/api/alerts/${id}`)).body as AlertReceipt;

  it('is that nobody has seen it until somebody has, then who and when', async () => {
    const { id } = await send();
    await sweep();
    expect((await receiptOf(id)).seen).toBeNull();
    const { nextHint } = await scene.phone.socket();
    const [flag] = await flagsOfPatient();
    expect((await receiptOf(id)).seen).toBeNull();
    await caseOf(flag!.id);
    expect((await receiptOf(id)).seen).toBeNull();
    expect((await scene.desk.call('post', `/api/flags/${flag!.id}/seen`)).status).toBe(204);
    await nextHint((hint) => hint.topic === 'alert' && hint.alertId === id);
    const { seen } = await receiptOf(id);
    expect(seen?.by).toBe('Noor Haddad');
    expect(Math.abs(Date.parse(seen!.at) - Date.now())).toBeLessThan(60_000);
  });

  it('is who was first, also when a colleague looks later', async () => {
    const { id } = await send();
    await sweep();
    const [flag] = await flagsOfPatient();
    await scene.desk.call('post', `/api/flags/${flag!.id}/seen`);
    const colleague = await scene.web.signIn(
      await makePerson(scene.database, scene.clinicId, ['on-call-clinician']),
    );
    await colleague.call('post', `/api/flags/${flag!.id}/seen`);
    expect((await receiptOf(id)).seen?.by).toBe('Noor Haddad');
  });

  it("is nothing about another patient's alert: it is not there, and the asking is on record", async () => {
    const stranger = await makePatient(scene.database, scene.clinicId);
    const { clientId } = await plantAlert(scene.database, stranger);
    const asked = await scene.phone.call('get', `/api/alerts/${clientId}`);
    const mistake = await scene.phone.call('post', `/api/alerts/${clientId}/mistakes`, {
      id: randomUUID(),
      answeredAt: new Date().toISOString(),
    });
    expect([asked.status, mistake.status]).toEqual([404, 404]);
    const { rows } = await scene.database.asSuperuser.query(
      `select detail from audit_entries where action = 'access.denied' and person_id = $1 order by at`,
      [scene.patient.personId],
    );
    expect(rows).toEqual([
      { detail: { route: 'get /api/alerts/:alertId', alertId: clientId } },
      { detail: { route: 'post /api/alerts/:alertId/mistakes', alertId: clientId } },
    ]);
    expect(
      (
        await scene.database.asSuperuser.query('select from alert_mistakes where author_id = $1', [
          scene.patient.personId,
        ])
      ).rowCount,
    ).toBe(0);
  });
});
