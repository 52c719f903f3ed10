import { drizzle } from 'drizzle-orm/node-postgres';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { oneTimeTokens } from '#server/db/schema/gate.ts';
import { useToken } from '#server/features/accounts/one-time-tokens.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { countOf, linkOf, newPassword, plantInvited } from './scene.ts';

let database: TestDatabase;
let web: TestWeb;
let admin: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  admin = await makePerson(database, await makeClinic(database), ['administrator']);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const accept = (invitation: object, password = newPassword) =>
  web
    .anonymous()
    .call('post', '/api/invitations/accept', { invitation, way: { kind: 'password', password } });
const signIn = (email: string, password: string) =>
  web.anonymous().call('post', '/api/session', { email, password });

it('gives each of 500 tokens to one of 16 who use it at once', async () => {
  const { clinicId, personId } = admin;
  const at = new Date();
  const ids = (
    await drizzle({ client: database.pools.gate, casing: 'snake_case' })
      .insert(oneTimeTokens)
      .values(
        Array.from({ length: 500 }, () => ({
          clinicId,
          personId,
          kind: 'invitation' as const,
          createdAt: at,
          expiresAt: new Date(at.getTime() + 60_000),
        })),
      )
      .returning({ id: oneTimeTokens.id })
  ).map(({ id }) => id);
  expect(ids).toHaveLength(500);
  for (const id of ids) {
    const tries = await Promise.all(
      Array.from({ length: 16 }, () => useToken(database.pools.gate, id, 'invitation', at)),
    );
    expect(tries.filter((row) => row?.id === id)).toHaveLength(1);
    expect(tries.filter((row) => row === null)).toHaveLength(15);
  }
}, 180_000);

it('lets one of 16 in who accept an invitation at once, and it is that one’s password that opens', async () => {
  for (let time = 0; time < 3; time += 1) {
    const { person, card } = await plantInvited(database, admin);
    const passwords = Array.from({ length: 16 }, (_, n) => `${newPassword} number ${n}`);
    const answers = await Promise.all(passwords.map((password) => accept(linkOf(card.id), password)));
    const winners = answers.flatMap(({ status }, n) => (status === 201 ? [n] : []));
    expect(answers.filter(({ status }) => status === 410)).toHaveLength(15);
    expect(winners).toHaveLength(1);
    expect((await signIn(person.email, passwords[winners[0]!]!)).status).toBe(201);
    expect((await signIn(person.email, passwords[(winners[0]! + 1) % 16]!)).status).toBe(401);
    const live = 'person_id = $1 and revoked_at is null';
    // The winner's session, and that of the sign-in above.
    expect(await countOf(database, 'signed_in_sessions', live, [person.personId])).toBe(2);
  }
}, 90_000);

it('gives an address to one of two clinics whose invitations are accepted at once', async () => {
  const there = await makePerson(database, await makeClinic(database), ['administrator']);
  const email = 'both@clinics.example';
  const [here, away] = [
    await plantInvited(database, admin, 'patient', email),
    await plantInvited(database, there, 'patient', email),
  ];
  const answers = await Promise.all([accept(linkOf(here.card.id)), accept(linkOf(away.card.id))]);
  expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
  expect(await countOf(database, 'credentials', 'email = $1', [email])).toBe(1);
});
