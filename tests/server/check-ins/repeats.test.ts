import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { CheckInReceipt } from '#shared/check-ins/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { makeClinic, makePatient, makePerson, type TestPatient } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { alertBody, checkInBody } from './bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let patient: TestPatient;
let phone: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  const lead = await makePerson(database, clinicId, ['therapist']);
  patient = await makePatient(database, clinicId, { lead });
  phone = await web.signIn(patient);
});

const count = async (text: string, values: unknown[]): Promise<number> => {
  const { rows } = await database.asSuperuser.query<{ n: number }>(
    `select count(*)::int as n ${text}`,
    values,
  );
  return rows[0]!.n;
};
const rowsOf = (clientId: string) => count('from check_ins where client_id = $1', [clientId]);
const jobsOf = (clientId: string) =>
  count(`from jobs.job j join check_ins c on j.data ->> 'checkInId' = c.id::text where c.client_id = $1`, [
    clientId,
  ]);
const flagsOf = (clientId: string) => count('from flags where source_client_id = $1', [clientId]);
const sweep = () => sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);

describe('the same check-in sent again', () => {
  it('is the same success with the same receipt, and stays one row, one job and one audit entry', async () => {
    const body = checkInBody();
    const first = await phone.call('post', '/api/check-ins', body);
    const again = await phone.call('post', '/api/check-ins', { ...body, sentAt: new Date().toISOString() });
    expect([again.status, again.body]).toEqual([201, first.body]);
    expect([await rowsOf(body.id), await jobsOf(body.id)]).toEqual([1, 1]);
    expect(
      await count(`from audit_entries where action = 'check-in.sent' and patient_id = $1`, [
        patient.patientId,
      ]),
    ).toBe(1);
  });

  it('twenty times at once is one row, one job and one flag', async () => {
    const body = checkInBody({ answers: { symptoms: ['fall'], painNow: 4 } });
    const answers = await Promise.all(
      Array.from({ length: 20 }, () => phone.call('post', '/api/check-ins', body)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    await sweep();
    expect([await rowsOf(body.id), await jobsOf(body.id), await flagsOf(body.id)]).toEqual([1, 1, 1]);
  });

  it('is still the same after it was evaluated', async () => {
    const body = checkInBody({ answers: { symptoms: ['fall'] } });
    await phone.call('post', '/api/check-ins', body);
    await sweep();
    expect((await phone.call('post', '/api/check-ins', body)).status).toBe(201);
    await sweep();
    expect([await rowsOf(body.id), await flagsOf(body.id)]).toEqual([1, 1]);
  });
});

describe('the same id', () => {
  it.each([
    ['other answers', { answers: { painNow: 9 } }],
    ['another kind', { kind: 'something-new' as const }],
  ])('with %s is a conflict, and the first stays as it was', async (_what, changes) => {
    const body = checkInBody();
    await phone.call('post', '/api/check-ins', body);
    const other = await phone.call('post', '/api/check-ins', { ...body, ...changes });
    expect(other.status).toBe(409);
    expect(other.body).toMatchObject({ type: 'urn:espalier:problem:id-conflict' });
    const { rows } = await database.asSuperuser.query(
      'select answers, kind from check_ins where client_id = $1',
      [body.id],
    );
    expect(rows).toEqual([{ answers: body.answers, kind: body.kind }]);
  });

  it('from another patient is a check-in of its own', async () => {
    const body = checkInBody();
    await phone.call('post', '/api/check-ins', body);
    const otherPhone = await web.signIn(await makePatient(database, clinicId));
    const other = await otherPhone.call('post', '/api/check-ins', { ...body, answers: { painNow: 9 } });
    expect(other.status).toBe(201);
    expect(await rowsOf(body.id)).toBe(2);
  });

  it('with answers in another order is the same check-in', async () => {
    const body = checkInBody({ answers: { painNow: 1, painWorst: 2 } });
    await phone.call('post', '/api/check-ins', body);
    const again = { ...body, answers: { painWorst: 2, painNow: 1 } };
    expect((await phone.call('post', '/api/check-ins', again)).status).toBe(201);
  });
});

describe('a check-in and its job', () => {
  it('are kept together or not at all, and the same id is a success once it can be', async () => {
    const body = checkInBody();
    await database.asSuperuser.query('revoke insert on all tables in schema jobs from espalier_app');
    const failed = await phone.call('post', '/api/check-ins', body);
    await database.asSuperuser.query('grant insert on all tables in schema jobs to espalier_app');
    expect(failed.status).toBe(500);
    expect(Object.keys(failed.body as object).sort()).toEqual(['reportId', 'status', 'title', 'type']);
    expect(await rowsOf(body.id)).toBe(0);

    expect((await phone.call('post', '/api/check-ins', body)).status).toBe(201);
    expect([await rowsOf(body.id), await jobsOf(body.id)]).toEqual([1, 1]);
  });

  it('wait for nothing when the record cannot be written either', async () => {
    const body = checkInBody();
    await database.asSuperuser.query('revoke insert on audit_entries from espalier_app');
    const failed = await phone.call('post', '/api/check-ins', body);
    await database.asSuperuser.query('grant insert on audit_entries to espalier_app');
    expect(failed.status).toBe(500);
    expect(await rowsOf(body.id)).toBe(0);
  });
});

describe("a device's clock that is wrong", () => {
  const dayMs = 24 * 60 * 60_000;
  const sentWithClock = async (offMs: number, agoMs = 0) => {
    const deviceNow = Date.now() + offMs;
    const body = checkInBody({
      answeredAt: new Date(deviceNow - agoMs).toISOString(),
      sentAt: new Date(deviceNow).toISOString(),
    });
    const answer = await phone.call('post', '/api/check-ins', body);
    expect(answer.status, answer.text).toBe(201);
    return answer.body as CheckInReceipt;
  };
  const dateInNewYork = (at: number) =>
    new Date(at).toLocaleDateString('en-CA', { timeZone: 'America/New_York' });

  it.each([
    ['a day ahead', dayMs],
    ['a day behind', -dayMs],
    ['six minutes ahead', 6 * 60_000],
  ])("%s is stored and marked, with the server's date", async (_what, offMs) => {
    const receipt = await sentWithClock(offMs);
    expect(receipt).toMatchObject({ clockDoubtful: true, localDate: dateInNewYork(Date.now()) });
    const { rows } = await database.asSuperuser.query(
      'select clock_doubtful from check_ins where client_id = $1',
      [receipt.id],
    );
    expect(rows).toEqual([{ clock_doubtful: true }]);
  });

  it('by four minutes is not in doubt', async () => {
    expect(await sentWithClock(4 * 60_000)).toMatchObject({ clockDoubtful: false });
  });

  it('is not what a late check-in has: answered off line yesterday, it is for yesterday', async () => {
    const receipt = await sentWithClock(0, dayMs);
    expect(receipt).toMatchObject({ clockDoubtful: false, localDate: dateInNewYork(Date.now() - dayMs) });
  });
});

describe('an alert', () => {
  it('sent twenty times at once is one row and one job', async () => {
    const body = alertBody();
    const answers = await Promise.all(
      Array.from({ length: 20 }, () => phone.call('post', '/api/alerts', body)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(await count('from alerts where client_id = $1', [body.id])).toBe(1);
    expect(
      await count(
        `from jobs.job j join alerts a on j.data ->> 'alertId' = a.id::text where a.client_id = $1`,
        [body.id],
      ),
    ).toBe(1);
  });

  it.each([
    ['other answers', { answers: { danger: ['cold-hand' as const] } }],
    ['another check-in', { checkInId: randomUUID() }],
  ])('under the same id with %s is a conflict', async (_what, changes) => {
    const body = alertBody();
    await phone.call('post', '/api/alerts', body);
    const other = await phone.call('post', '/api/alerts', { ...body, ...changes });
    expect([other.status, other.body]).toMatchObject([409, { type: 'urn:espalier:problem:id-conflict' }]);
  });
});
