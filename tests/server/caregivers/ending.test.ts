import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { makeClinic, makePatient } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
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
  phone = await web.signIn(await makePatient(database, clinicId));
});

const body = (changes: Record<string, unknown> = {}) => {
  const id = randomUUID();
  return {
    id,
    name: 'Teo Valcourt',
    email: `${id}@people.example`,
    relationship: 'husband',
    mayCheckIn: true,
    mayMessage: false,
    until: null,
    ...changes,
  };
};
const invite = (sent: unknown, who = phone) => who.call('post', '/api/caregivers', sent);

describe('help that ends before the person has come', () => {
  const openInvitations = async (email: string) => {
    const { rows } = await database.asSuperuser.query<{ open: boolean }>(
      `select i.revoked_at is null and t.revoked_at is null as open
       from invitations i join people p on p.id = i.person_id join one_time_tokens t on t.id = i.id
       where p.email = $1`,
      [email],
    );
    return rows.map(({ open }) => open);
  };

  it('takes the invitation back, so that its link opens nothing', async () => {
    const sent = body();
    const { id } = (await invite(sent)).body as { id: string };
    expect(await openInvitations(sent.email)).toEqual([true]);
    expect((await phone.call('delete', `/api/caregivers/${id}`)).status).toBe(200);
    expect(await openInvitations(sent.email)).toEqual([false]);
  });

  it('leaves it open where another patient has let them in too', async () => {
    const sent = body();
    const { id } = (await invite(sent)).body as { id: string };
    const other = await makePatient(database, clinicId);
    expect((await invite(body({ email: sent.email }), await web.signIn(other))).status).toBe(201);
    await phone.call('delete', `/api/caregivers/${id}`);
    expect(await openInvitations(sent.email)).toContain(true);
  });
});
