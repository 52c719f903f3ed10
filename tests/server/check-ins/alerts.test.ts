import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { AlertReceipt, PostAlert } from '#shared/check-ins/contract.ts';
import type { FlagCase, MorningRound } from '#shared/triage/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantAlert } from '../records.ts';
import { alertBody, checkInBody } from './bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;
let patient: TestPatient;
let phone: TestBrowser;

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
  phone = await web.signIn(patient);
});

/** Evaluates what is waiting, as if it had waited for the ten seconds that are the worker's. */
const sweep = async () => {
  for (const table of ['alerts', 'check_ins']) {
    await database.asSuperuser.query(
      `update ${table} set received_at = received_at - interval '11 seconds' where evaluated_at is null`,
    );
  }
  await sweepUnevaluated(database.pools.app, new Date(), silentLog);
};
const flagsOfPatient = async () =>
  ((await desk.call('get', '/api/flags')).body as MorningRound).flags.filter(
    (flag) => flag.patient.id === patient.patientId,
  );
const caseOf = async (flagId: string) => (await desk.call('get', `/api/flags/${flagId}`)).body as FlagCase;
const send = async (changes: Partial<PostAlert> = {}) => {
  const body = alertBody(changes);
  const answer = await phone.call('post', '/api/alerts', body);
  expect(answer.status, answer.text).toBe(201);
  return body;
};
const finish = async (id: string, answers: Parameters<typeof checkInBody>[0]) => {
  const answer = await phone.call('post', '/api/check-ins', checkInBody({ id, ...answers }));
  expect(answer.status, answer.text).toBe(201);
};

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
    await finish(checkInId, { answers: { danger: ['bleeding', 'cold-hand'] } });
    await sweep();
    const { rows } = await database.asSuperuser.query<{ occasion: string }>(
      `select n.occasion from notifications n join flags f on n.occasion like 'flag:' || f.id || ':%'
       where f.patient_id = $1 and n.person_id = $2`,
      [patient.patientId, noor.personId],
    );
    expect(rows.map(({ occasion }) => occasion.split(':')[2]).sort()).toEqual(['alert', 'check-in']);
  });
});

describe('a tick by mistake', () => {
  it('is a new record: the alert and its flag stay, and the clinician reads of it', async () => {
    const { id } = await send();
    await sweep();
    const body = { id: randomUUID(), answeredAt: new Date().toISOString() };
    const said = await phone.call('post', `/api/alerts/${id}/mistakes`, body);
    expect(said.status).toBe(201);
    const again = await phone.call('post', `/api/alerts/${id}/mistakes`, body);
    expect([again.status, again.body]).toEqual([201, said.body]);
    const flags = await flagsOfPatient();
    expect(flags).toMatchObject([{ state: 'open', urgency: 'emergency' }]);
    const { events } = await caseOf(flags[0]!.id);
    expect(events.map(({ kind }) => kind)).toEqual(['raised', 'ticked-by-mistake']);
  });

  it('is on the record also when it is said before the alert was evaluated', async () => {
    const { id } = await send();
    await phone.call('post', `/api/alerts/${id}/mistakes`, {
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
    expect((await phone.call('post', `/api/alerts/${one.id}/mistakes`, body)).status).toBe(201);
    expect((await phone.call('post', `/api/alerts/${other.id}/mistakes`, body)).status).toBe(409);
  });
});

describe('what the patient is told of an alert', () => {
  const receiptOf = async (id: string) => (await phone.call('get', `/api/alerts/${id}`)).body as AlertReceipt;

  it('is that nobody has seen it until somebody has, then who and when', async () => {
    const { id } = await send();
    await sweep();
    expect((await receiptOf(id)).seen).toBeNull();
    const { nextHint } = await phone.socket();
    const [flag] = await flagsOfPatient();
    expect((await receiptOf(id)).seen).toBeNull();
    await caseOf(flag!.id);
    expect((await receiptOf(id)).seen).toBeNull();
    expect((await desk.call('post', `/api/flags/${flag!.id}/seen`)).status).toBe(204);
    await nextHint((hint) => hint.topic === 'alert' && hint.alertId === id);
    const { seen } = await receiptOf(id);
    expect(seen?.by).toBe('Noor Haddad');
    expect(Math.abs(Date.parse(seen!.at) - Date.now())).toBeLessThan(60_000);
  });

  it('is who was first, also when a colleague looks later', async () => {
    const { id } = await send();
    await sweep();
    const [flag] = await flagsOfPatient();
    await desk.call('post', `/api/flags/${flag!.id}/seen`);
    const colleague = await web.signIn(await makePerson(database, clinicId, ['on-call-clinician']));
    await colleague.call('post', `/api/flags/${flag!.id}/seen`);
    expect((await receiptOf(id)).seen?.by).toBe('Noor Haddad');
  });

  it("is nothing about another patient's alert: it is not there, and the asking is on record", async () => {
    const stranger = await makePatient(database, clinicId);
    const { clientId } = await plantAlert(database, stranger);
    const asked = await phone.call('get', `/api/alerts/${clientId}`);
    const mistake = await phone.call('post', `/api/alerts/${clientId}/mistakes`, {
      id: randomUUID(),
      answeredAt: new Date().toISOString(),
    });
    expect([asked.status, mistake.status]).toEqual([404, 404]);
    const { rows } = await database.asSuperuser.query(
      `select detail from audit_entries where action = 'access.denied' and person_id = $1 order by at`,
      [patient.personId],
    );
    expect(rows).toEqual([
      { detail: { route: 'get /api/alerts/:alertId', alertId: clientId } },
      { detail: { route: 'post /api/alerts/:alertId/mistakes', alertId: clientId } },
    ]);
    expect(
      (
        await database.asSuperuser.query('select from alert_mistakes where author_id = $1', [
          patient.personId,
        ])
      ).rowCount,
    ).toBe(0);
  });
});

describe('a tick after the flag was closed', () => {
  const close = (flagId: string) =>
    desk.call('post', `/api/flags/${flagId}/close`, {
      outcome: 'entered-by-mistake',
      worthRaising: 'no',
      note: '',
    });
  const mails = async () => {
    const { rows } = await database.asSuperuser.query<{ count: number }>(
      'select count(*)::int as count from notifications where person_id = $1',
      [noor.personId],
    );
    return rows[0]?.count ?? 0;
  };
  const stateOf = async (flagId: string) => (await caseOf(flagId)).state;

  it('opens it again and tells again, though the same was called a mistake before', async () => {
    const first = await send({ answers: { danger: ['chest-or-breathing'] } });
    await sweep();
    await phone.call('post', `/api/alerts/${first.id}/mistakes`, {
      id: randomUUID(),
      answeredAt: new Date().toISOString(),
    });
    const flagId = (await flagsOfPatient())[0]!.id;
    expect((await close(flagId)).status).toBe(200);
    const before = await mails();

    await send({ checkInId: first.checkInId, answers: { danger: ['chest-or-breathing'] } });
    await sweep();
    expect(await stateOf(flagId)).toBe('open');
    expect(await mails()).toBe(before + 1);
  });

  it('opens it again when the same rule now says something worse', async () => {
    const low = { symptoms: ['low-mood' as const] };
    const { checkInId } = await send({ answers: { ...low, selfHarm: 'not-sure' } });
    await sweep();
    const flagId = (await flagsOfPatient())[0]!.id;
    await close(flagId);
    await send({ checkInId, answers: { ...low, selfHarm: 'yes' } });
    await sweep();
    expect(await stateOf(flagId)).toBe('open');
    expect((await caseOf(flagId)).reasons.map(({ title }) => title)).toContain('Thoughts of self-harm');
  });
});

it('is not told as seen by a look that came before it', async () => {
  const first = await send();
  await sweep();
  const flagId = (await flagsOfPatient())[0]!.id;
  await desk.call('post', `/api/flags/${flagId}/seen`);
  const seenOf = async (id: string) =>
    ((await phone.call('get', `/api/alerts/${id}`)).body as AlertReceipt).seen;
  expect(await seenOf(first.id)).toMatchObject({ by: 'Noor Haddad' });

  const second = await send({ checkInId: first.checkInId, answers: { danger: ['bleeding', 'cold-hand'] } });
  expect(await seenOf(second.id)).toBeNull();
  await sweep();
  expect(await seenOf(second.id)).toBeNull();
  expect((await phone.call('get', '/api/today')).body).toMatchObject({ openFlag: { seenBy: null } });
  await desk.call('post', `/api/flags/${flagId}/seen`);
  expect(await seenOf(second.id)).toMatchObject({ by: 'Noor Haddad' });
});

it('keeps what it said when the finished check-in says something milder', async () => {
  const { checkInId } = await send({
    answers: {
      danger: ['chest-or-breathing', 'fainted-or-coughed-blood'],
      chestWhen: 'now',
      faintedWhen: 'now',
    },
  });
  await sweep();
  await finish(checkInId, { answers: { danger: ['chest-or-breathing'], chestWhen: 'earlier' } });
  await sweep();
  const [flag] = await flagsOfPatient();
  expect(flag).toMatchObject({ urgency: 'emergency' });
  const { reasons } = await caseOf(flag!.id);
  expect(reasons[0]?.title).toContain('Fainted or coughed up blood, now');
});
