import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Delivery } from '#shared/notifications/contract.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { rowsOf, tell } from './outgoing.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let office: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  office = await web.signIn(await makePerson(database, clinicId, ['administrator']));
});

type List = Record<'failed' | 'late' | 'recent', Delivery[]>;
const list = async () => (await office.call('get', '/api/deliveries')).body as List;
const unsent = async () => ((await office.call('get', '/api/worker')).body as { unsent: number }).unsent;
const again = (id: string) => office.call('post', `/api/deliveries/${id}/again`);

/** A notification so many minutes old, in a state. */
const planted = async (
  kind: 'new-emergency' | 'new-message',
  columns: Record<string, unknown>,
  minutesAgo = 0,
) => {
  const now = new Date(Date.now() - minutesAgo * 60_000);
  const [id] = await tell(database, noor, { kind, path: `/${randomUUID()}` }, now);
  for (const [name, value] of Object.entries(columns)) {
    await database.asSuperuser.query(`update notifications set ${name} = $2 where id = $1`, [id, value]);
  }
  return id!;
};
const inAnHour = () => new Date(Date.now() + 3_600_000);

describe('the administrator', () => {
  it('sees what failed or came back, what is late, and the newest of all', async () => {
    const failed = await planted('new-emergency', { state: 'failed', last_error: 'EENVELOPE', attempts: 30 });
    const cameBack = await planted('new-message', { state: 'bounced', outcome: 'came-back' });
    const overdue = await planted('new-message', {}, 11);
    const retried = await planted('new-message', { attempts: 5, due_at: inAnHour() }, 11);
    const quiet = await planted('new-message', { due_at: inAnHour() }, 11);
    const dropped = await planted('new-emergency', { state: 'dropped' }, 11);
    const fresh = await planted('new-message', {});
    const { failed: ended, late, recent } = await list();
    const ids = (rows: Delivery[]) => rows.map(({ id }) => id).sort();
    expect(ids(ended)).toEqual([failed, cameBack].sort());
    expect(ids(late)).toEqual([overdue, retried].sort());
    expect(ids(recent)).toEqual([failed, cameBack, overdue, retried, quiet, dropped, fresh].sort());
    expect(ended.find(({ id }) => id === failed)).toMatchObject({
      person: { id: noor.personId, name: 'Noor Haddad' },
      channel: 'email',
      kind: 'new-emergency',
      state: 'failed',
      attempts: 30,
      lastError: 'EENVELOPE',
      sentAt: null,
    });
  });

  it.each(['failed', 'bounced'])('sends once more what is %s, from the beginning', async (state) => {
    const id = await planted('new-message', { state, attempts: 31, last_error: 'x', outcome: 'y' }, 60 * 48);
    const [first, second] = await Promise.all([again(id), again(id)]);
    expect([first.status, second.status].sort()).toEqual([200, 409]);
    expect(await rowsOf(database, noor)).toMatchObject([
      { id, state: 'pending', attempts: 0, last_error: null, outcome: null },
    ]);
    const audit = await database.asSuperuser.query(
      `select subject_id from audit_entries where action = 'delivery.sent-again' and clinic_id = $1`,
      [clinicId],
    );
    expect(audit.rows).toEqual([{ subject_id: id }]);
  });

  it.each(['pending', 'sent', 'dropped'])('cannot send again what is %s', async (state) => {
    const id = await planted('new-message', { state });
    expect((await again(id)).status).toBe(409);
    expect(await rowsOf(database, noor)).toMatchObject([{ id, state }]);
  });
});

describe('the warning on every clinic screen', () => {
  it.each<[string, Parameters<typeof planted>, number]>([
    ['a page that failed', ['new-emergency', { state: 'failed' }], 1],
    ['a page that came back', ['new-emergency', { state: 'bounced' }], 1],
    ['a page that failed over a week ago', ['new-emergency', { state: 'failed' }, 8 * 24 * 60], 0],
    ['a page that had nobody left to reach', ['new-emergency', { state: 'dropped' }, 60], 0],
    ['a message whose mail came back', ['new-message', { state: 'bounced' }], 0],
    ['a message that is overdue', ['new-message', {}, 11], 1],
    [
      'a message that waits for the end of quiet hours',
      ['new-message', { due_at: new Date('2030-01-01') }, 11],
      0,
    ],
    ['a message that was just written', ['new-message', {}], 0],
  ])('counts for %s', async (_what, [kind, columns, minutesAgo], count) => {
    await planted(kind, columns, minutesAgo);
    expect(await unsent()).toBe(count);
  });
});
