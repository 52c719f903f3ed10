import { createECDH, randomBytes, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTx } from '#server/db/with-tx.ts';
import { addPushDevice } from '#server/notifications/push-devices.ts';
import { forgetPushOfSession } from '#server/notifications/push-subscriptions.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

type Device = { id: string; deviceName: string; current: boolean; lastSentAt: string | null };

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let therapist: TestPerson;
let patient: TestPerson;
let browser: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
  therapist = await makePerson(database, clinicId, ['therapist']);
  patient = await makePatient(database, clinicId);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  await database.asSuperuser.query('delete from push_subscriptions');
  browser = await web.signIn(patient);
});

const subscription = () => {
  const pair = createECDH('prime256v1');
  pair.generateKeys();
  return {
    endpoint: `https://push.example/push/${randomUUID()}`,
    p256dh: pair.getPublicKey('base64url'),
    auth: randomBytes(16).toString('base64url'),
  };
};

const add = (from: TestBrowser, body: unknown = subscription()) =>
  from.call('post', '/api/push-subscriptions', body);

const devicesOf = async (from: TestBrowser): Promise<Device[]> => {
  const { body } = await from.call('get', '/api/push-subscriptions');
  return (body as { subscriptions: Device[] }).subscriptions;
};

const sessionOf = async (personId: string): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    'select id from signed_in_sessions where person_id = $1 order by started_at desc limit 1',
    [personId],
  );
  return rows[0]!.id;
};

describe('the devices that may wake somebody', () => {
  it('a browser is given the key of this server, and is listed with its name once it is added', async () => {
    const { body: key } = await browser.call('get', '/api/push-key');
    expect(key).toEqual({ publicKey: testSecrets.vapidPublicKey });
    const answer = await browser.call('post', '/api/push-subscriptions', subscription(), {
      'user-agent':
        'Mozilla/5.0 (iPhone; CPU iPhone OS 18_5 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Mobile/15E148 Safari/604.1',
    });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ deviceName: 'Safari on iPhone', current: true, lastSentAt: null });
    expect(await devicesOf(browser)).toEqual([answer.body]);
    const elsewhere = await web.signIn(patient);
    expect((await devicesOf(elsewhere)).map(({ current }) => current)).toEqual([false]);
  });

  it('the same browser added again by the same person is the same device', async () => {
    const body = subscription();
    const first = await add(browser, body);
    const again = await add(browser, { ...body, auth: randomBytes(16).toString('base64url') });
    expect((again.body as Device).id).toBe((first.body as Device).id);
    expect(await devicesOf(browser)).toHaveLength(1);
  });

  it('a browser that somebody else adds wakes nobody else any more, and is another device', async () => {
    const body = subscription();
    const first = await add(browser, body);
    const next = await web.signIn(therapist);
    const second = await add(next, body);
    expect((second.body as Device).id).not.toBe((first.body as Device).id);
    expect(await devicesOf(browser)).toEqual([]);
    expect(await devicesOf(next)).toHaveLength(1);
  });

  it('an endpoint that is no push service on the public network is refused beside its field, and not kept', async () => {
    for (const endpoint of [
      'http://push.example/1',
      'https://127.0.0.1/1',
      'https://localhost/1',
      'https://10.0.0.1/',
    ]) {
      const answer = await add(browser, { ...subscription(), endpoint });
      expect(answer.status, endpoint).toBe(422);
      expect(answer.body).toMatchObject({ errors: [{ field: 'endpoint' }] });
    }
    const keys = await add(browser, { ...subscription(), p256dh: 'short', auth: 'short' });
    expect((keys.body as { errors: { field: string }[] }).errors.map(({ field }) => field)).toEqual([
      'p256dh',
      'auth',
    ]);
    expect(await devicesOf(browser)).toEqual([]);
  });

  it('a device is removed by its owner, and is not there for anybody else', async () => {
    const { body } = await add(browser);
    const path = `/api/push-subscriptions/${(body as Device).id}`;
    const other = await web.signIn(therapist);
    expect((await other.call('delete', path)).status).toBe(404);
    expect((await other.call('post', `${path}/test`)).status).toBe(404);
    expect((await browser.call('delete', path)).status).toBe(204);
    expect((await browser.call('delete', path)).status).toBe(404);
    expect(await devicesOf(browser)).toEqual([]);
  });

  it('a test is written for that one device and no other', async () => {
    await add(browser);
    const { body } = await add(browser);
    const { id } = body as Device;
    expect((await browser.call('post', `/api/push-subscriptions/${id}/test`)).status).toBe(204);
    const { rows } = await database.asSuperuser.query(
      'select channel, kind, target, path, state from notifications where person_id = $1',
      [patient.personId],
    );
    expect(rows).toEqual([
      { channel: 'push', kind: 'test', target: id, path: '/account/notifications', state: 'pending' },
    ]);
  });

  it('signing out leaves nothing on the device that wakes the next user', async () => {
    await add(browser);
    expect((await browser.call('delete', '/api/session')).status).toBe(204);
    const { rows } = await database.asSuperuser.query('select id from push_subscriptions');
    expect(rows).toEqual([]);
  });

  it('a device that is being added while its session ends is not left behind, whichever comes first', async () => {
    const actor = {
      ...({ kind: 'person', clinicId, personId: patient.personId } as const),
      ...{ roles: ['patient' as const], patientId: null, caring: null },
    };
    const site = { gate: database.pools.gate, publicUrl: web.url, ...testSecrets };
    for (let round = 0; round < 20; round += 1) {
      await web.signIn(patient);
      const sessionId = await sessionOf(patient.personId);
      const adding = withTx(database.pools.app, actor, (tx) =>
        addPushDevice(tx, site, actor, { sessionId, userAgent: null, ...subscription() }, new Date()),
      );
      const ending = (async () => {
        await database.pools.gate.query('update signed_in_sessions set revoked_at = now() where id = $1', [
          sessionId,
        ]);
        await withTx(database.pools.app, actor, (tx) => forgetPushOfSession(tx, clinicId, sessionId));
      })();
      const [added] = await Promise.allSettled([adding, ending]);
      if (added.status === 'rejected') expect(added.reason).toMatchObject({ code: 'not-signed-in' });
      const { rows } = await database.asSuperuser.query(
        'select id from push_subscriptions where session_id = $1',
        [sessionId],
      );
      expect(rows).toEqual([]);
    }
  });
});
