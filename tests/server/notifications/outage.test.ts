import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { createSender } from '#server/notifications/sender.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { addDevice, outsideWorld, rowsOf, tell } from './outgoing.ts';

let database: TestDatabase;
let noor: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  noor = await makePerson(database, await makeClinic(database), ['therapist']);
});

afterAll(() => database.drop());

beforeEach(async () => {
  await database.asSuperuser.query('delete from notifications');
});

const minuteMs = 60_000;

it('loses and doubles nothing of 500 while mail and push are down for ten minutes, and sends emergencies first', async () => {
  const startedAt = new Date('2026-12-01T15:00:00Z').getTime();
  let now = new Date(startedAt);
  await addDevice(database, noor);
  // 250 occasions by mail and push: every 25th is an emergency, which comes between the others.
  for (let n = 0; n < 250; n += 1) {
    const kind = n % 25 === 24 ? 'new-emergency' : 'new-message';
    await tell(database, noor, { kind, occasion: `made:${n}`, path: `/there/${n}` }, now);
  }
  const queued = await rowsOf(database, noor);
  expect(queued).toHaveLength(500);

  const world = outsideWorld(database);
  const arrived: string[] = [];
  const upAt = startedAt + 10 * minuteMs;
  for (const channel of ['email', 'push'] as const) {
    world.answer(channel, async ({ id, kind }) => {
      if (now.getTime() < upAt) throw Object.assign(new Error('down'), { code: 'ECONNREFUSED' });
      arrived.push(`${kind} ${id}`);
      return { providerId: null };
    });
  }
  // Two workers, as any number may run; each looks at what is due whenever the clock has moved on.
  const options = { clock: () => now, log: silentLog };
  const workers = [createSender(world.tools, options), createSender(world.tools, options)];
  const look = async () => {
    for (const worker of workers) worker.wake();
    for (const worker of workers) await worker.idle();
  };
  await look();
  const isEmergency = (one: string) => one.startsWith('new-emergency');
  while (arrived.length < 500 && now.getTime() < startedAt + 60 * minuteMs) {
    const { rows } = await database.asSuperuser.query<{ due: Date }>(
      `select min(due_at) as due from notifications where state = 'pending'`,
    );
    const due = rows[0]!.due.getTime();
    // The way back up is told by no event: what is due then is tried, the rest at its own pause.
    now = new Date(now.getTime() < upAt && due > upAt ? upAt : Math.max(due, now.getTime()));
    await look();
  }

  const rows = await rowsOf(database, noor);
  expect(rows.map(({ id }) => id).sort()).toEqual(queued.map(({ id }) => id).sort());
  expect(new Set(rows.map(({ state }) => state))).toEqual(new Set(['sent']));
  expect(arrived).toHaveLength(500);
  expect(new Set(arrived).size).toBe(500);
  // Pages are tried twice a minute, so all twenty are out before the first of the others.
  expect(arrived.slice(0, 20).every(isEmergency)).toBe(true);
  expect(now.getTime() - upAt).toBeLessThanOrEqual(10 * minuteMs);
}, 240_000);

it('takes an emergency before all that was queued earlier, one at a time', async () => {
  const now = new Date('2026-12-02T15:00:00Z');
  for (let n = 0; n < 20; n += 1) {
    await tell(database, noor, { kind: 'new-message', path: `/queue/${n}` }, now, { channels: ['email'] });
  }
  await tell(database, noor, { kind: 'new-urgent', path: '/queue/urgent' }, now, { channels: ['email'] });
  await tell(database, noor, { kind: 'new-emergency', path: '/queue/emergency' }, now, {
    channels: ['email'],
  });
  const world = outsideWorld(database);
  const sender = createSender(world.tools, { clock: () => now, log: silentLog, atOnce: 1 });
  sender.wake();
  await sender.idle();
  expect(world.taken).toHaveLength(22);
  expect(world.taken.slice(0, 2).map(({ kind }) => kind)).toEqual(['new-emergency', 'new-urgent']);
});
