import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTx } from '#server/db/with-tx.ts';
import { deliver } from '#server/notifications/delivery.ts';
import { createSender } from '#server/notifications/sender.ts';
import { notify } from '#server/notifications/service.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { addDevice, change, outsideWorld, rowsOf, tell } from './outgoing.ts';

let database: TestDatabase;
let clinicId: string;
let noor: TestPerson;
let now: Date;
const later = (seconds: number) => new Date(now.getTime() + seconds * 1000);

beforeAll(async () => {
  database = await cloneDatabase();
  clinicId = await makeClinic(database);
});

afterAll(() => database.drop());

beforeEach(async () => {
  noor = await makePerson(database, clinicId, ['therapist']);
  await change(database, noor, { phone: '+15185550123' });
  now = new Date('2026-12-01T15:00:00Z');
});

const send = async (at: Date) => {
  const world = outsideWorld(database);
  const sender = createSender(world.tools, { clock: () => at, log: silentLog });
  sender.wake();
  await sender.idle();
  return world.taken.filter(({ email }) => email === noor.email);
};
const emails = async () => (await rowsOf(database, noor)).filter(({ channel }) => channel === 'email');

describe('many occasions about one thing', () => {
  it('are told once while the first of them waits, and that one goes out', async () => {
    for (let second = 0; second < 20; second += 1) {
      await tell(database, noor, { kind: 'new-message', path: '/messages/1' }, later(second));
    }
    expect(await emails()).toHaveLength(1);
    expect(await send(later(21))).toHaveLength(1);
    await tell(database, noor, { kind: 'new-message', path: '/messages/1' }, later(22));
    expect(await emails()).toHaveLength(2);
    expect(await send(later(23))).toHaveLength(1);
  });

  it('never join what is about another thing, of another kind, for another device or another person', async () => {
    const ada = await makePerson(database, clinicId, ['therapist']);
    const devices = [await addDevice(database, noor), await addDevice(database, noor)];
    for (const path of ['/round/1', '/round/2']) {
      for (const kind of ['new-emergency', 'new-urgent'] as const) {
        for (const person of [noor, ada]) await tell(database, person, { kind, path }, now);
      }
    }
    const rows = await rowsOf(database, noor);
    for (const channel of ['email', 'sms'] as const) {
      expect(rows.filter((row) => row.channel === channel)).toHaveLength(4);
    }
    // An urgent flag rings no telephone by default.
    expect(rows.filter(({ channel }) => channel === 'phone')).toHaveLength(2);
    for (const id of devices) expect(rows.filter(({ target }) => target === id)).toHaveLength(4);
    expect(await rowsOf(database, ada)).toHaveLength(4);
  });

  it('bring the waiting one forward, so that an emergency does not wait for the pause of an older one', async () => {
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, now);
    const world = outsideWorld(database);
    world.answer('email', () => Promise.reject(new Error('down')));
    for (const { id } of await rowsOf(database, noor))
      await deliver(world.tools, { clinicId, id }, () => now);
    expect((await emails())[0]!.due_at).toEqual(later(5));
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, later(1));
    expect(await emails()).toMatchObject([{ state: 'pending', due_at: later(1) }]);
    expect((await send(later(1))).map(({ channel }) => channel)).toEqual(['email']);
  });

  it('do not join a row that is just being sent: the new occasion is told by one of its own', async () => {
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, now);
    const world = outsideWorld(database);
    let arrived = () => {};
    let letGo = () => {};
    const underWay = new Promise<void>((resolve) => (arrived = resolve));
    world.answer('email', async () => {
      arrived();
      await new Promise<void>((resolve) => (letGo = resolve));
      return { providerId: null };
    });
    const [email] = await emails();
    const sending = deliver(world.tools, { clinicId, id: email!.id }, () => now);
    await underWay;
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, later(1));
    letGo();
    await sending;
    expect((await emails()).map(({ state }) => state).sort()).toEqual(['pending', 'sent']);
  });

  it('hold the row they join until they are there to be read', async () => {
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, now);
    const [email] = await emails();
    const world = outsideWorld(database);
    let committed = false;
    let sending: Promise<unknown> = Promise.resolve();
    world.answer('email', async () => {
      expect(committed).toBe(true);
      return { providerId: null };
    });
    await withTx(database.pools.app, { kind: 'system', clinicId }, async (tx) => {
      const second = { kind: 'new-emergency', occasion: 'flag:second', path: '/round/1' } as const;
      await notify(tx, clinicId, [noor.personId], second, now);
      sending = deliver(world.tools, { clinicId, id: email!.id }, () => now);
      // The claim stands at the row's lock, as the database sees it.
      await expect
        .poll(async () => {
          const { rows } = await database.asSuperuser.query(
            `select from pg_stat_activity where datname = current_database() and wait_event_type = 'Lock'`,
          );
          return rows.length;
        })
        .toBe(1);
      committed = true;
    });
    await sending;
    expect(await emails()).toMatchObject([{ state: 'sent' }]);
  });

  it('ring a telephone once in five minutes, and again after that', async () => {
    const rings = async (at: Date) => {
      await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, at);
      return (await send(at)).map(({ channel }) => channel).sort();
    };
    expect(await rings(now)).toEqual(['email', 'phone', 'sms']);
    expect(await rings(later(299))).toEqual(['email']);
    expect(await rings(later(301))).toEqual(['email', 'phone', 'sms']);
  });

  it('do not join what is about to be given up', async () => {
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, now);
    await tell(database, noor, { kind: 'new-emergency', path: '/round/1' }, later(13 * 3600));
    expect(await emails()).toHaveLength(2);
  });
});
