import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { linkTokenOf } from '#server/features/accounts/one-time-tokens.ts';
import { NotDeliverable } from '#server/notifications/channels.ts';
import { deliver } from '#server/notifications/delivery.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { outsideWorld, rowsOf, tell, type World } from './outgoing.ts';

let database: TestDatabase;
let clinicId: string;
let noor: TestPerson;
let world: World;
const now = new Date('2026-12-01T15:00:00Z');

beforeAll(async () => {
  database = await cloneDatabase();
  clinicId = await makeClinic(database);
});

afterAll(() => database.drop());

beforeEach(async () => {
  noor = await makePerson(database, clinicId, ['therapist']);
  world = outsideWorld(database);
});

const send = (id: string) => deliver(world.tools, { clinicId, id }, () => now);
const rowOf = async (id: string) => (await rowsOf(database, noor)).find((row) => row.id === id)!;
const tellOne = async (occasion: Parameters<typeof tell>[2]) => {
  const [id] = await tell(database, noor, occasion, now);
  return id!;
};

describe('a one-time link', () => {
  const issue = async (kind: string, columns: Record<string, unknown> = {}) => {
    const token = {
      id: randomUUID(),
      clinic_id: clinicId,
      person_id: noor.personId,
      kind,
      created_at: now,
      expires_at: new Date(now.getTime() + 60_000),
      ...columns,
    };
    const names = Object.keys(token);
    await database.asSuperuser.query(
      `insert into one_time_tokens (${names.join(', ')}) values (${names.map((_, i) => `$${i + 1}`).join(', ')})`,
      Object.values(token),
    );
    return token.id;
  };
  const row = async (id: string): Promise<string> => {
    const { rows } = await database.asSuperuser.query<{ row: string }>(
      'select t::text as row from notifications t where id = $1',
      [id],
    );
    return rows[0]!.row;
  };

  it.each([
    ['invitation', '/invitation'],
    ['password-reset', '/reset-password'],
  ] as const)(
    'of the kind %s gets its secret when it is sent, and no row ever holds it',
    async (kind, page) => {
      const tokenId = await issue(kind);
      const id = await tellOne({ kind, path: `${page}#${tokenId}` });
      await send(id);
      const secret = linkTokenOf(testSecrets.tokenSecret, tokenId);
      expect(world.taken).toMatchObject([{ path: `${page}#${secret}`, email: noor.email }]);
      expect(await row(id)).not.toContain(secret.split('.')[1]);
    },
  );

  it('that confirms a new address goes to that address; that it bounces says nothing of the old one', async () => {
    const tokenId = await issue('email-change', { email: 'new@people.example' });
    const emails: string[] = [];
    world.answer('email', ({ email }) => {
      emails.push(email);
      return Promise.reject(new NotDeliverable('bounced'));
    });
    await send(await tellOne({ kind: 'email-change', path: `/confirm-email#${tokenId}` }));
    expect(emails).toEqual(['new@people.example']);
    const { rows } = await database.asSuperuser.query('select email_bounced_at from people where id = $1', [
      noor.personId,
    ]);
    expect(rows).toEqual([{ email_bounced_at: null }]);
  });

  it.each([
    ['used', { used_at: new Date() }],
    ['revoked', { revoked_at: new Date() }],
    ['expired', { expires_at: new Date('2026-12-01T14:59:59Z') }],
    ['of another kind', { kind: 'password-reset' }],
    ['of another clinic', { clinic_id: randomUUID() }],
  ])('that is %s by then is not sent', async (_what, columns) => {
    const tokenId = await issue('invitation', columns);
    const id = await tellOne({ kind: 'invitation', path: `/invitation#${tokenId}` });
    await send(id);
    expect(await rowOf(id)).toMatchObject({ state: 'dropped', last_error: 'link-spent' });
    expect(world.tries()).toBe(0);
  });
});
