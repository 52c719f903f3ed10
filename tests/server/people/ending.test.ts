import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { StaffPerson } from '#shared/people/contract.ts';
import { withTx } from '#server/db/with-tx.ts';
import { announce } from '#server/realtime/announce.ts';
import { makeClinic, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { countOf, linkOf, plantInvited, problemOf, staffOf } from './scene.ts';

const reason = 'Has left the clinic.';
const atMostMs = 2_000;

let database: TestDatabase;
let webs: [TestWeb, TestWeb];
let clinicId: string;
let admin: TestPerson;
let desk: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  webs = [await startWeb(database), await startWeb(database)];
  clinicId = await makeClinic(database);
  admin = await makePerson(database, clinicId, ['administrator']);
  desk = await webs[0].signIn(admin);
});

afterAll(async () => {
  for (const web of webs) await web.stop();
  await database.drop();
});

const deactivate = (person: TestPerson, by: TestBrowser = desk) =>
  by.call('post', `/api/people/${person.personId}/deactivation`, { reason });
const reactivate = (person: TestPerson) =>
  desk.call('post', `/api/people/${person.personId}/reactivation`, { reason: 'Is back.' });
const removeAdministrator = (person: TestPerson, by: TestBrowser = desk) =>
  by.call('delete', `/api/people/${person.personId}/roles/administrator`);
const administratorsOf = (clinic: string) =>
  countOf(
    database,
    'people p join person_roles r on r.clinic_id = p.clinic_id and r.person_id = p.id',
    `p.clinic_id = $1 and p.active and r.role = 'administrator'`,
    [clinic],
  );

describe('ending somebody’s access', () => {
  it('closes their sockets on every web within two seconds, and every request gets 401', async () => {
    const person = await makePerson(database, clinicId, ['therapist']);
    const browsers = [await webs[0].signIn(person), await webs[1].signIn(person)];
    const sockets = [await browsers[0]!.socket(), await browsers[1]!.socket()];
    const bystander = await (await webs[1].signIn(admin)).socket();
    const startedAt = performance.now();
    const answer = await deactivate(person);
    await Promise.all(sockets.map(({ ended }) => ended));
    expect(performance.now() - startedAt).toBeLessThan(atMostMs);
    expect(answer).toMatchObject({ status: 200, body: { active: false } });
    for (const browser of browsers) {
      expect((await browser.call('get', '/api/flags')).status).toBe(401);
      expect((await browser.call('get', '/api/session')).body).toEqual({ me: null });
      await expect(browser.socket()).rejects.toThrow('not-signed-in');
    }
    const again = await webs[0]
      .anonymous()
      .call('post', '/api/session', { email: person.email, password: testPassword });
    expect(again.status).toBe(401);
    expect(bystander.socket.connected).toBe(true);
  });

  it('takes their push and their open invitation with it', async () => {
    const { person, card } = await plantInvited(database, admin, 'staff');
    await database.asSuperuser.query(
      `insert into push_subscriptions (clinic_id, person_id, session_id, endpoint, p256dh, auth, device_name, created_at)
       values ($1, $2, $3, 'https://push.example/1', 'x', 'x', 'Phone', now())`,
      [clinicId, person.personId, randomUUID()],
    );
    const answer = await deactivate(person);
    expect((answer.body as StaffPerson).invitation).toMatchObject({ id: card.id, state: 'revoked' });
    expect(await countOf(database, 'push_subscriptions', 'person_id = $1', [person.personId])).toBe(0);
    const looked = await webs[1]
      .anonymous()
      .call('post', '/api/invitations/look', { invitation: linkOf(card.id) });
    expect(looked.body).toMatchObject({ state: 'revoked', email: null });
  });

  it('says on record who did it and why, and is a conflict the second time', async () => {
    const person = await makePerson(database, clinicId, ['billing']);
    expect((await deactivate(person)).status).toBe(200);
    expect(problemOf(await deactivate(person)).detail).toBe('This person’s access has ended already.');
    const { rows } = await database.asSuperuser.query(
      `select person_id, detail from audit_entries where action = 'person.deactivated' and subject_id = $1`,
      [person.personId],
    );
    expect(rows).toEqual([{ person_id: admin.personId, detail: { reason } }]);
  });

  it('is undone by letting them in again, and no session from before comes back', async () => {
    const person = await makePerson(database, clinicId, ['therapist']);
    const before = await webs[0].signIn(person);
    await deactivate(person);
    // As if a sign-in had been under way and left its session after the others were ended.
    await database.asSuperuser.query('update signed_in_sessions set revoked_at = null where person_id = $1', [
      person.personId,
    ]);
    expect((await before.call('get', '/api/flags')).status).toBe(401);
    expect(await reactivate(person)).toMatchObject({ status: 200, body: { active: true } });
    expect((await before.call('get', '/api/flags')).status).toBe(401);
    const after = await webs[1].signIn(person);
    expect((await after.call('get', '/api/flags')).status).toBe(200);
    expect(problemOf(await reactivate(person)).detail).toBe('This person has access already.');
  });

  it('is refused to whoever asks for their own, with the reason, and leaves them signed in', async () => {
    const elsewhere = await makeClinic(database);
    const last = await makePerson(database, elsewhere, ['administrator', 'billing']);
    const own = await webs[0].signIn(last);
    const acts = [deactivate, removeAdministrator];
    for (const act of acts) {
      expect(problemOf(await act(last, own))).toMatchObject({
        status: 409,
        detail: 'You are the clinic’s last administrator. Give somebody else the role first.',
      });
    }
    await makePerson(database, elsewhere, ['administrator']);
    expect(problemOf(await deactivate(last, own)).detail).toBe(
      'You cannot end your own access. Ask another administrator.',
    );
    expect(problemOf(await removeAdministrator(last, own)).detail).toBe(
      'You cannot end your own administrator role. Ask another administrator.',
    );
    expect(await staffOf(own, last.personId)).toMatchObject({
      active: true,
      roles: ['administrator', 'billing'],
    });
  });
});

describe('the last administrator', () => {
  it('keeps access and role when somebody acts who was deactivated while waiting for their turn', async () => {
    const elsewhere = await makeClinic(database);
    const last = await makePerson(database, elsewhere, ['administrator', 'billing']);
    const former = await makePerson(database, elsewhere, ['administrator', 'billing']);
    const theirDesk = await webs[0].signIn(former);
    // The request is let in while they are an administrator and gets its turn once they no longer are active.
    const blocker = await database.asSuperuser.connect();
    try {
      await blocker.query('begin');
      await blocker.query(`select pg_advisory_xact_lock(hashtextextended($1, 0))`, [
        `people-change:${elsewhere}`,
      ]);
      const acts = [deactivate(last, theirDesk), removeAdministrator(last, theirDesk)];
      await expect
        .poll(() => countOf(database, 'pg_locks', `locktype = 'advisory' and not granted`, []))
        .toBe(2);
      await blocker.query('update people set active = false where id = $1', [former.personId]);
      await blocker.query('commit');
      expect((await Promise.all(acts)).map(({ status }) => status)).toEqual([401, 401]);
    } finally {
      blocker.release();
    }
    expect(await administratorsOf(elsewhere)).toBe(1);
  });

  it('is one of two who end each other’s access at the same instant, in ten races', async () => {
    for (let race = 0; race < 10; race += 1) {
      const clinic = await makeClinic(database);
      const [a, b] = [
        await makePerson(database, clinic, ['administrator']),
        await makePerson(database, clinic, ['administrator']),
      ];
      const [deskOfA, deskOfB] = [await webs[0].signIn(a), await webs[1].signIn(b)];
      const answers = await Promise.all([deactivate(b, deskOfA), deactivate(a, deskOfB)]);
      expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
      expect(await administratorsOf(clinic)).toBe(1);
    }
  }, 60_000);

  it('is one of two who take each other’s role at the same instant, in ten races', async () => {
    for (let race = 0; race < 10; race += 1) {
      const clinic = await makeClinic(database);
      const [a, b] = [
        await makePerson(database, clinic, ['administrator', 'billing']),
        await makePerson(database, clinic, ['administrator', 'billing']),
      ];
      const [deskOfA, deskOfB] = [await webs[0].signIn(a), await webs[1].signIn(b)];
      const answers = await Promise.all([removeAdministrator(b, deskOfA), removeAdministrator(a, deskOfB)]);
      expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
      expect(await administratorsOf(clinic)).toBe(1);
    }
  }, 60_000);
});

describe('a role that was taken', () => {
  it('ends the hints that came with it within two seconds, on a socket that stays open', async () => {
    const person = await makePerson(database, clinicId, ['therapist', 'billing']);
    const browser = await webs[1].signIn(person);
    const { socket, hints, nextHint } = await browser.socket();
    const colleague = await (
      await webs[1].signIn(await makePerson(database, clinicId, ['therapist']))
    ).socket();
    const tellClinicians = (flagId: string) =>
      withTx(database.pools.app, { kind: 'system', clinicId }, (tx) =>
        announce(tx, { clinicians: clinicId }, { topic: 'flags', flagId }),
      );
    const isFlag = (id: string) => (hint: { topic: string; flagId?: string }) => hint.flagId === id;
    const [before, after] = [randomUUID(), randomUUID()];
    await tellClinicians(before);
    await nextHint(isFlag(before));

    const startedAt = performance.now();
    const taken = await desk.call('delete', `/api/people/${person.personId}/roles/therapist`);
    expect(taken).toMatchObject({ status: 200, body: { roles: ['billing'] } });
    await nextHint(({ topic }) => topic === 'session');
    expect(performance.now() - startedAt).toBeLessThan(atMostMs);

    await tellClinicians(after);
    await colleague.nextHint(isFlag(after));
    // Sent after the other, on the same way: once this is there, the other would be.
    await withTx(database.pools.app, { kind: 'system', clinicId }, (tx) =>
      announce(tx, { person: person.personId }, { topic: 'today' }),
    );
    await nextHint(({ topic }) => topic === 'today');
    expect(hints.some(isFlag(after))).toBe(false);
    expect(socket.connected).toBe(true);
    expect((await browser.call('get', '/api/flags')).status).toBe(403);
  });
});
