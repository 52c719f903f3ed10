import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTx } from '#server/db/with-tx.ts';
import { codeHashOf, issueToken, shortCodeOf } from '#server/features/accounts/one-time-tokens.ts';
import { invitationCardsOf } from '#server/features/people/inviting.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import {
  codeOf,
  countOf,
  invite,
  linkOf,
  newPassword,
  plantInvited,
  plantNewcomer,
  problemOf,
  siteOf,
} from './scene.ts';

const hour = 60 * 60_000;
const day = 24 * hour;

let database: TestDatabase;
let web: TestWeb;
let admin: TestPerson;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  admin = await makePerson(database, await makeClinic(database), ['administrator']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  now = new Date();
  await database.asSuperuser.query('delete from sign_in_attempts');
});

const look = (invitation: object, browser: TestBrowser = web.anonymous()) =>
  browser.call('post', '/api/invitations/look', { invitation });
const accept = (invitation: object, way: object = { kind: 'password', password: newPassword }) =>
  web.anonymous().call('post', '/api/invitations/accept', { invitation, way });

describe('looking at an invitation', () => {
  it('says by link and by code whom it brings in, and uses nothing up', async () => {
    const { person, card } = await plantInvited(database, admin);
    const open = {
      state: 'open',
      kind: 'patient',
      clinic: { name: 'Test Clinic', phone: '555-0100', emergencyNumber: '911' },
      firstName: 'Marta',
      email: person.email,
      expiresAt: card.expiresAt,
    };
    for (let time = 0; time < 3; time += 1) {
      expect(await look(linkOf(card.id))).toMatchObject({ status: 200, body: open });
      expect(await look(codeOf(card.id))).toMatchObject({ status: 200, body: open });
    }
    expect((await accept(linkOf(card.id))).status).toBe(201);
  });

  it('takes a code however it is typed, with letters read as the digits they look like', async () => {
    const { card } = await plantInvited(database, admin);
    const { code } = codeOf(card.id);
    const typed = ` ${code.toLowerCase().replace('-', ' ').replaceAll('1', 'l').replaceAll('0', 'o')} `;
    expect(await look({ code: typed })).toMatchObject({ status: 200, body: { state: 'open' } });
  });

  it.each([
    { kind: 'patient', life: 14 * day },
    { kind: 'caregiver', life: 14 * day },
    { kind: 'staff', life: 72 * hour },
  ] as const)('finds that of a $kind open to its last moment, and then expired', async ({ kind, life }) => {
    const { card } = await plantInvited(database, admin, kind);
    const issued = Date.parse(card.createdAt);
    now = new Date(issued + life - 1);
    expect((await look(linkOf(card.id))).body).toMatchObject({ state: 'open', kind });
    now = new Date(issued + life);
    const late = { state: 'expired', firstName: null, email: null };
    expect((await look(linkOf(card.id))).body).toMatchObject(late);
    expect(problemOf(await accept(linkOf(card.id)))).toMatchObject({
      status: 410,
      type: 'urn:espalier:problem:link-spent',
      detail: 'This invitation has expired. Ask the clinic for a new one.',
    });
  });

  it('finds it revoked once a new one is made, and names nobody any more', async () => {
    const { person, card } = await plantInvited(database, admin);
    const next = await invite(database, admin, person);
    expect((await look(linkOf(card.id))).body).toMatchObject({
      state: 'revoked',
      firstName: null,
      email: null,
    });
    expect((await accept(codeOf(card.id))).status).toBe(410);
    expect((await look(linkOf(next.id))).body).toMatchObject({ state: 'open' });
  });

  it('leaves one open of ten that were made at once', async () => {
    const person = await plantNewcomer(database, admin, ['patient']);
    const cards = await Promise.all(Array.from({ length: 10 }, () => invite(database, admin, person)));
    const states = [];
    for (const { id } of cards) states.push(((await look(linkOf(id))).body as { state: string }).state);
    expect(states.filter((state) => state === 'open')).toHaveLength(1);
    expect(states.filter((state) => state === 'revoked')).toHaveLength(9);
  });

  it('refuses a link that was not made here, and one whose invitation was never kept', async () => {
    const orphan = randomUUID();
    const codeHash = codeHashOf(testSecrets.tokenSecret, shortCodeOf(testSecrets.tokenSecret, orphan));
    const { clinicId, personId } = admin;
    const expiresAt = new Date(now.getTime() + day);
    await issueToken(
      database.pools.gate,
      { id: orphan, clinicId, personId, kind: 'invitation', expiresAt, codeHash },
      now,
    );
    const { token } = linkOf(orphan);
    for (const key of [
      linkOf(orphan),
      codeOf(orphan),
      { token: `${token}x` },
      { token: orphan },
      { token: '.' },
    ]) {
      expect((await look(key)).status).toBe(410);
      expect((await accept(key)).status).toBe(410);
    }
  });
});

describe('guessing codes', () => {
  it('waits after five wrong ones from one address, however many are sent at once, and links go on', async () => {
    const { card } = await plantInvited(database, admin);
    const tries = await Promise.all(Array.from({ length: 40 }, () => look({ code: 'AAAAA-AAAAA' })));
    expect(tries.filter(({ status }) => status === 410)).toHaveLength(5);
    expect(tries.filter(({ status }) => status === 429)).toHaveLength(35);
    expect((await look(codeOf(card.id))).status).toBe(429);
    expect((await look(linkOf(card.id))).status).toBe(200);
    now = new Date(now.getTime() + 30_000);
    expect((await look(codeOf(card.id))).status).toBe(200);
  });

  it('slows down for everybody together, and lets the right code in seconds later', async () => {
    const { card } = await plantInvited(database, admin);
    const wrong = async () => {
      // As from another address each time.
      await database.asSuperuser.query('delete from sign_in_attempts where failures < 6');
      return look({ code: 'AAAAA-AAAAA' });
    };
    await database.asSuperuser.query(
      `insert into sign_in_attempts values (encode(sha256('letter-codes'), 'base64'), 260, $1, $1)`,
      [now],
    );
    // The key as the server writes it: base64url without padding.
    await database.asSuperuser.query(
      `update sign_in_attempts set email_hash = rtrim(translate(email_hash, '+/', '-_'), '=')`,
    );
    expect((await wrong()).status).toBe(410);
    expect(await wrong()).toMatchObject({ status: 429, body: { retryAfter: 10 } });
    now = new Date(now.getTime() + 10_000);
    expect((await look(codeOf(card.id))).status).toBe(200);
  });
});

describe('a mailed invitation', () => {
  it('is one notification that holds the id and no secret, and nothing without e-mail', async () => {
    const person = await plantNewcomer(database, admin, ['patient']);
    await invite(database, admin, person);
    expect(await countOf(database, 'notifications', 'person_id = $1', [person.personId])).toBe(0);
    const card = await invite(database, admin, person, { byEmail: true });
    const { rows } = await database.asSuperuser.query(
      'select kind, channel, occasion, path from notifications where person_id = $1',
      [person.personId],
    );
    expect(rows).toEqual([
      {
        kind: 'invitation',
        channel: 'email',
        occasion: `invitation:${card.id}`,
        path: `/invitation#${card.id}`,
      },
    ]);
  });
});

describe('the clinic’s view', () => {
  it('shows the newest invitation, and one that was used as accepted also before its row says so', async () => {
    const { person, card } = await plantInvited(database, admin);
    const cardOf = () =>
      withTx(database.pools.app, { kind: 'person', ...admin }, async (tx) =>
        (
          await invitationCardsOf(
            tx,
            siteOf(database),
            admin.clinicId,
            [person.personId, admin.personId],
            now,
          )
        ).get(person.personId),
      );
    expect(await cardOf()).toEqual(card);
    const next = await invite(database, admin, person);
    expect(await cardOf()).toMatchObject({ id: next.id, state: 'open' });
    await database.asSuperuser.query('update one_time_tokens set used_at = now() where id = $1', [next.id]);
    expect(await cardOf()).toMatchObject({ id: next.id, state: 'accepted' });
  });
});
