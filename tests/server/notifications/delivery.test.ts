import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { NotDeliverable } from '#server/notifications/channels.ts';
import { deliver } from '#server/notifications/delivery.ts';
import { createSender } from '#server/notifications/sender.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { addDevice, change, outsideWorld, rowsOf, tell, type World } from './outgoing.ts';

let database: TestDatabase;
let clinicId: string;
let noor: TestPerson;
let world: World;
let now: Date;
const clock = () => now;
const pass = (seconds: number) => {
  now = new Date(now.getTime() + seconds * 1000);
};

beforeAll(async () => {
  database = await cloneDatabase();
  clinicId = await makeClinic(database);
});

afterAll(() => database.drop());

beforeEach(async () => {
  await database.asSuperuser.query('delete from notifications');
  noor = await makePerson(database, clinicId, ['therapist']);
  world = outsideWorld(database);
  now = new Date('2026-12-01T15:00:00Z');
});

const down = () =>
  Promise.reject(Object.assign(new Error('refused by mx.example'), { code: 'ECONNREFUSED' }));
const send = (id: string) => deliver(world.tools, { clinicId, id }, clock);
const rowOf = async (id: string) => (await rowsOf(database, noor)).find((row) => row.id === id)!;
const tellOne = async (...[occasion, options]: [Parameters<typeof tell>[2], Parameters<typeof tell>[4]?]) => {
  const [id] = await tell(database, noor, occasion, now, options);
  return id!;
};

describe('a delivery', () => {
  it('is marked with what the gateway calls it, and not sent again', async () => {
    await change(database, noor, { phone: '+15185550123' });
    const id = await tellOne({ kind: 'new-emergency' }, { channels: ['sms'] });
    world.answer('sms', async () => ({ providerId: 'SM1' }));
    expect(await send(id)).toBe(true);
    expect(await send(id)).toBe(false);
    expect(await rowOf(id)).toMatchObject({
      state: 'sent',
      attempts: 1,
      sent_at: now,
      provider_id: 'SM1',
      leased_until: null,
    });
    expect(world.tries()).toBe(1);
  });

  it('goes out once, however many workers reach for it at once', async () => {
    const id = await tellOne({ kind: 'new-message' });
    let letGo = () => {};
    const held = new Promise<void>((resolve) => (letGo = resolve));
    world.answer('email', () => held.then(() => ({ providerId: null })));
    const tries = Array.from({ length: 16 }, () => send(id));
    await expect.poll(() => world.tries()).toBe(1);
    letGo();
    const results = await Promise.all(tries);
    expect(results.filter(Boolean)).toHaveLength(1);
    expect(world.tries()).toBe(1);
  });

  it('is left alone while somebody is at it, and taken up under the same id once their lease has run out', async () => {
    const id = await tellOne({ kind: 'new-message' });
    const ids: string[] = [];
    world.answer('email', (outgoing) => {
      ids.push(outgoing.id);
      // As if the process had ended here: nothing is ever heard of this try.
      return ids.length === 1 ? new Promise(() => undefined) : Promise.resolve({ providerId: null });
    });
    void send(id);
    await expect.poll(() => ids.length).toBe(1);
    pass(59);
    expect(await send(id)).toBe(false);
    pass(1);
    expect(await send(id)).toBe(true);
    expect(ids).toEqual([id, id]);
    expect(await rowOf(id)).toMatchObject({ state: 'sent', attempts: 2 });
  });

  it('waits longer after each failure, up to an hour, and is given up after a day', async () => {
    const id = await tellOne({ kind: 'new-message' });
    world.answer('email', down);
    const startedAt = now.getTime();
    const pauses: number[] = [];
    while ((await rowOf(id)).state === 'pending') {
      expect(await send(id)).toBe(true);
      const { due_at: dueAt, state } = await rowOf(id);
      if (state !== 'pending') break;
      pauses.push((dueAt.getTime() - now.getTime()) / 1000);
      expect(await send(id)).toBe(false);
      now = dueAt;
    }
    const minutes = (count: number) => count * 60;
    expect(pauses.slice(0, 11)).toEqual([
      5,
      15,
      30,
      60,
      minutes(2),
      minutes(5),
      minutes(10),
      minutes(20),
      minutes(30),
      3600,
      3600,
    ]);
    expect(await rowOf(id)).toMatchObject({
      state: 'failed',
      last_error: 'ECONNREFUSED',
      leased_until: null,
    });
    const hours = (now.getTime() - startedAt) / 3_600_000;
    expect(hours).toBeGreaterThanOrEqual(24);
    expect(hours).toBeLessThan(25);
  });

  it('of a page is tried every half minute at least for the first ten minutes', async () => {
    const id = await tellOne({ kind: 'new-emergency' });
    world.answer('email', down);
    const startedAt = now.getTime();
    let longest = 0;
    while (now.getTime() - startedAt < 10 * 60_000) {
      await send(id);
      const { due_at: dueAt } = await rowOf(id);
      longest = Math.max(longest, dueAt.getTime() - now.getTime());
      now = dueAt;
    }
    expect(longest).toBe(30_000);
  });

  it('waits for the end of quiet hours, unless it is a page', async () => {
    await change(database, noor, { quiet_from: '21:00', quiet_until: '07:00', time_zone: 'Europe/Berlin' });
    now = new Date('2026-12-01T22:00:00Z');
    const [message, page] = [await tellOne({ kind: 'new-message' }), await tellOne({ kind: 'new-urgent' })];
    expect(await send(message)).toBe(false);
    expect(await send(page)).toBe(true);
    now = new Date('2026-12-02T06:00:00Z');
    expect(await send(message)).toBe(true);
  });

  it('that an address refuses for good comes back, and says so at the person until a mail is taken again', async () => {
    const bouncedAt = async () => {
      const { rows } = await database.asSuperuser.query<{ at: Date | null }>(
        'select email_bounced_at as at from people where id = $1',
        [noor.personId],
      );
      return rows[0]!.at;
    };
    const id = await tellOne({ kind: 'new-message' });
    world.answer('email', () => Promise.reject(new NotDeliverable('bounced')));
    await send(id);
    expect(await rowOf(id)).toMatchObject({ state: 'bounced', last_error: 'bounced' });
    expect(await bouncedAt()).toEqual(now);
    world.answer('email', async () => ({ providerId: null }));
    await send(await tellOne({ kind: 'new-message', path: '/another' }));
    expect(await bouncedAt()).toBeNull();
  });

  it('that a gateway refuses has failed at once, as nothing that waiting mends', async () => {
    await change(database, noor, { phone: '+15185550123' });
    const id = await tellOne({ kind: 'new-emergency' }, { channels: ['phone'] });
    world.answer('phone', () => Promise.reject(new NotDeliverable('refused')));
    await send(id);
    expect(await rowOf(id)).toMatchObject({ state: 'failed', last_error: 'refused', attempts: 1 });
  });

  it('to a browser that is gone removes it; a page that only it would have woken takes another way', async () => {
    const device = await addDevice(database, noor);
    await change(database, noor, { phone: '+15185550123' });
    await database.asSuperuser.query(
      `insert into notification_settings values ($1, $2, 'new-urgent', 'sms', false)`,
      [clinicId, noor.personId],
    );
    const page = { kind: 'new-urgent', occasion: 'flag:gone' } as const;
    await tell(database, noor, page, now);
    const push = (await rowsOf(database, noor)).find(({ channel }) => channel === 'push')!;
    expect((await rowsOf(database, noor)).map(({ channel }) => channel)).toEqual(['email', 'push']);
    world.answer('push', () => Promise.reject(new NotDeliverable('gone')));
    await send(push.id);
    expect(await rowOf(push.id)).toMatchObject({ state: 'dropped', last_error: 'gone' });
    const left = await database.asSuperuser.query('select from push_subscriptions where id = $1', [device]);
    expect(left.rowCount).toBe(0);
    expect((await rowsOf(database, noor)).map(({ channel }) => channel)).toEqual(['email', 'push', 'sms']);
  });

  it.each([
    ['somebody who has left', { active: false }, ['email'] as const],
    ['a number that is no longer known', { phone: null }, ['sms'] as const],
  ])('to %s is dropped, and does not wait for ever', async (_whom, columns, channels) => {
    await change(database, noor, { phone: '+15185550123' });
    const id = await tellOne({ kind: 'new-emergency' }, { channels });
    await change(database, noor, columns);
    expect(await send(id)).toBe(true);
    expect(await rowOf(id)).toMatchObject({ state: 'dropped' });
    expect(world.tries()).toBe(0);
  });
});

describe('the sender', () => {
  it('goes on with the next when marking one has failed', async () => {
    await database.asSuperuser.query(
      `create function refuse_sent() returns trigger language plpgsql as $$
         begin if new.state = 'sent' and new.path = '/stuck' then raise 'cannot mark'; end if; return new; end $$;
       create trigger refuse_sent before update on notifications for each row execute function refuse_sent()`,
    );
    await tellOne({ kind: 'new-message', path: '/stuck' });
    pass(1);
    const next = await tellOne({ kind: 'new-message', path: '/next' });
    const sender = createSender(world.tools, { clock, log: silentLog });
    for (let round = 0; round < 2; round += 1) {
      sender.wake();
      await sender.idle();
    }
    expect(await rowOf(next)).toMatchObject({ state: 'sent' });
    await database.asSuperuser.query('drop trigger refuse_sent on notifications');
  });
});
