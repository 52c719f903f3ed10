import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { beat } from '#server/features/clinic/worker-health.ts';
import { listenForHints } from '#server/realtime/bridge.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  testPassword,
  type TestPatient,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { checkInBody } from '../server/check-ins/bodies.ts';
import { plantCheckIn } from '../server/records.ts';
import { severable, type SeverableDatabase } from './severable-database.ts';

let database: TestDatabase;
let severed: SeverableDatabase;
let web: TestWeb;
let patient: TestPatient;
let desk: TestBrowser;
let phone: TestBrowser;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  severed = await severable(database);
  web = await startWeb(severed, { clock: () => now });
  const clinicId = await makeClinic(database);
  patient = await makePatient(database, clinicId);
  desk = await web.signIn(await makePerson(database, clinicId, ['administrator']));
  phone = await web.signIn(patient);
});

afterAll(async () => {
  await web.stop();
  await severed.close();
  await database.drop();
});

beforeEach(async () => {
  now = new Date();
  await database.asSuperuser.query('delete from worker_heartbeats');
});

const health = () => web.anonymous().call('get', '/healthz');
const ready = () => web.anonymous().call('get', '/readyz');

describe('a web', () => {
  it('says that it lives and that it is ready', async () => {
    expect([(await health()).status, (await health()).body]).toEqual([200, { status: 'ok' }]);
    expect([(await ready()).status, (await ready()).body]).toMatchObject([200, { status: 'ready' }]);
  });

  it('lives without its database, is not ready, refuses writes as unavailable and comes back by itself', async () => {
    const { nextHint, ended } = await phone.socket();
    await severed.sever();
    expect((await health()).status).toBe(200);
    const unready = await ready();
    expect([unready.status, unready.body]).toEqual([
      503,
      { status: 'not ready', reason: 'The database is not reachable.' },
    ]);
    const body = checkInBody();
    const refused = await phone.call('post', '/api/check-ins', body);
    expect([refused.status, refused.body]).toMatchObject([503, { type: 'urn:espalier:problem:unavailable' }]);
    const signIn = { email: patient.email, password: testPassword };
    expect((await web.anonymous().call('post', '/api/session', signIn)).status).toBe(503);

    await severed.restore();
    await expect.poll(async () => (await ready()).status).toBe(200);
    expect((await phone.call('post', '/api/check-ins', body)).status).toBe(201);
    // Hints may have been missed: who listened is told to fetch everything, or closed, and then does on connecting.
    await Promise.race([nextHint(({ topic }) => topic === 'everything'), ended]);
    const again = await phone.socket();
    await phone.call('post', '/api/check-ins', checkInBody());
    await again.nextHint(({ topic }) => topic === 'today');
  });

  it('stops listening for hints also while it is still connecting', async () => {
    const hints = listenForHints(
      database.urls.app,
      { onAnnouncement: () => undefined, onGap: () => undefined },
      silentLog,
    );
    await expect(hints.stop()).resolves.toBeUndefined();
  });
});

describe('a late worker', () => {
  const late = async () => {
    const { status, body } = await ready();
    expect(status).toBe(200);
    const worker = (await desk.call('get', '/api/worker')).body as { late: boolean; unevaluated: number };
    const told = (body as { worker: { late: boolean } }).worker.late;
    expect(worker.late).toBe(told);
    return worker;
  };

  it('is told by /readyz and to every clinic screen after 30 s without a sign of life, and the web stays ready', async () => {
    expect(await late()).toMatchObject({ late: true });
    await beat(database.pools.gate, '00000000-0000-4000-8000-000000000001', now);
    expect(await late()).toMatchObject({ late: false });
    const beatAt = now.getTime();
    now = new Date(beatAt + 30_000);
    expect(await late()).toMatchObject({ late: false });
    now = new Date(beatAt + 30_001);
    expect(await late()).toMatchObject({ late: true });
  });

  it('is told as long as no other worker has given a sign of life', async () => {
    await beat(database.pools.gate, '00000000-0000-4000-8000-000000000001', new Date(now.getTime() - 60_000));
    expect(await late()).toMatchObject({ late: true });
    await beat(database.pools.gate, '00000000-0000-4000-8000-000000000002', now);
    expect(await late()).toMatchObject({ late: false });
  });

  it("is told with how many of this clinic's answers no rule has seen for over 30 s", async () => {
    const elsewhere = await makePatient(database, await makeClinic(database));
    const before = (await late()).unevaluated;
    for (const one of [patient, elsewhere]) {
      await plantCheckIn(database, one, { evaluated: false, at: new Date(now.getTime() - 31_000) });
      await plantCheckIn(database, one, { evaluated: false, at: new Date(now.getTime() - 29_000) });
    }
    expect((await late()).unevaluated).toBe(before + 1);
  });
});
