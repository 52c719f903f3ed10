import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { addDays } from '#shared/plans/calendar.ts';
import type { ProblemBody } from '#shared/problems/problems.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { enrolBody } from './bodies.ts';

// Half past ten on the evening of 30 November in New York, and 1 December in UTC.
const now = new Date('2026-12-01T03:30:00Z');

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  desk = await web.signIn(noor);
});

const body = (changes: Parameters<typeof enrolBody>[1] = {}) =>
  enrolBody(noor, {
    ...changes,
    operation: { surgeryDate: '2026-11-25', ...changes.operation },
    consent: changes.consent ?? { on: '2026-11-20', how: 'signed' },
  });
const enrol = (sent: unknown) => desk.call('post', '/api/patients', sent);
const errorsOf = (answer: { body: unknown }) => (answer.body as ProblemBody).errors ?? [];

describe('changing a record', () => {
  const recordOf = async (id: string) =>
    (await desk.call('get', `/api/patients/${id}`)).body as PatientRecord;
  const putFrom = (revision: string, { id, identity, operation, careTeam }: ReturnType<typeof body>) =>
    desk.call('put', `/api/patients/${id}`, { revision, identity, operation, careTeam });
  const put = async (id: string, sent: ReturnType<typeof body>) =>
    putFrom((await recordOf(id)).revision, sent);

  it('changes identity, safety facts and operation card together', async () => {
    const sent = body();
    await enrol(sent);
    const answer = await put(sent.id, {
      ...sent,
      identity: { ...sent.identity, name: 'Ada Moreau', bloodThinner: 'apixaban' },
      operation: { ...sent.operation, limits: 'External rotation to 20°' },
    });
    expect(answer.status, answer.text).toBe(200);
    expect(answer.body).toMatchObject({
      name: 'Ada Moreau',
      identity: { bloodThinner: 'apixaban' },
      operation: { limits: 'External rotation to 20°' },
    });
  });

  it('sends a new invitation to a new address, and the old one opens nothing', async () => {
    const sent = body({ invite: 'email' });
    const before = ((await enrol(sent)).body as PatientRecord).invitation!;
    const moved = { ...sent, identity: { ...sent.identity, email: `${randomUUID()}@patients.example` } };
    const after = ((await put(sent.id, moved)).body as PatientRecord).invitation!;
    expect(after).toMatchObject({ state: 'open', byEmail: true });
    expect(after.id).not.toBe(before.id);
    const { rows } = await database.asSuperuser.query(
      'select revoked_at is not null as revoked from one_time_tokens where id = $1',
      [before.id],
    );
    expect(rows).toEqual([{ revoked: true }]);
  });

  it('leaves the address to whoever signs in with it', async () => {
    const sent = body();
    const { personId } = (await enrol(sent)).body as PatientRecord;
    await database.asSuperuser.query(
      'insert into credentials (clinic_id, person_id, email) values ($1, $2, $3)',
      [clinicId, personId, sent.identity.email],
    );
    const answer = await put(sent.id, {
      ...sent,
      identity: { ...sent.identity, email: `${randomUUID()}@patients.example` },
    });
    expect(errorsOf(answer).map(({ field }) => field)).toEqual(['identity.email']);
    expect((await put(sent.id, sent)).status).toBe(200);
  });

  it('refuses surgery after the first check-in', async () => {
    const sent = body();
    const { personId } = (await enrol(sent)).body as PatientRecord;
    await database.asSuperuser.query(
      `insert into check_ins (clinic_id, patient_id, author_id, client_id, kind, answers, answered_at, received_at,
         local_date, rules_version, clock_doubtful)
       values ($1, $2, $3, gen_random_uuid(), 'daily', '{}', $4, $4, '2026-11-27', 'shipped-1', false)`,
      [clinicId, sent.id, personId, now],
    );
    const on = (surgeryDate: string) =>
      put(sent.id, { ...sent, operation: { ...sent.operation, surgeryDate } });
    expect(errorsOf(await on(addDays('2026-11-27', 1))).map(({ field }) => field)).toEqual([
      'operation.surgeryDate',
    ]);
    expect((await on('2026-11-27')).status).toBe(200);
  });

  describe('from a revision', () => {
    const named = (sent: ReturnType<typeof body>, name: string) => ({
      ...sent,
      identity: { ...sent.identity, name },
    });
    const changesKept = async (id: string) => {
      const { rows } = await database.asSuperuser.query(
        `select 1 from audit_entries where action = 'patient.changed' and subject_id = $1`,
        [id],
      );
      return rows.length;
    };

    it('takes the first of two changes made from one, tells the second, and half-saves nothing', async () => {
      const sent = body();
      const { revision } = (await enrol(sent)).body as PatientRecord;
      const petra = await makePerson(database, clinicId, ['therapist']);
      expect((await putFrom(revision, named(sent, 'Ada Moreau'))).status).toBe(200);
      const second = await putFrom(revision, {
        ...sent,
        identity: { ...sent.identity, allergies: 'penicillin' },
        operation: { ...sent.operation, limits: 'No rotation' },
        careTeam: [...sent.careTeam, { personId: petra.personId, isLead: false }],
      });
      expect(second.status).toBe(409);
      expect(second.body).toMatchObject({
        type: 'urn:espalier:problem:state-conflict',
        detail: 'A colleague changed this record in the meantime. Look at it again before you save.',
      });
      const now = await recordOf(sent.id);
      expect(now).toMatchObject({ name: 'Ada Moreau', identity: { allergies: null } });
      expect(now.operation.limits).toBeNull();
      expect(now.careTeam.map(({ personId }) => personId)).toEqual([noor.personId]);
      expect(await changesKept(sent.id)).toBe(1);
    });

    it('takes exactly one of ten at once', async () => {
      const sent = body();
      const { revision } = (await enrol(sent)).body as PatientRecord;
      const names = Array.from({ length: 10 }, (_, index) => `Ada Moreau ${'abcdefghij'[index]}`);
      const answers = await Promise.all(names.map((name) => putFrom(revision, named(sent, name))));
      const taken = answers.findIndex(({ status }) => status === 200);
      expect(answers.map(({ status }) => status).sort()).toEqual([200, ...Array<number>(9).fill(409)]);
      expect((await recordOf(sent.id)).name).toBe(names[taken]);
      expect(await changesKept(sent.id)).toBe(1);
    });

    it.each<[string, (sent: ReturnType<typeof body>, petra: TestPerson) => ReturnType<typeof body>]>([
      ['a safety fact', (sent) => ({ ...sent, identity: { ...sent.identity, bloodThinner: 'apixaban' } })],
      ['the operation card', (sent) => ({ ...sent, operation: { ...sent.operation, arm: 'right' } })],
      [
        'the care team alone',
        (sent, { personId }) => ({ ...sent, careTeam: [...sent.careTeam, { personId, isLead: false }] }),
      ],
    ])('is another one after a change of %s', async (_what, changed) => {
      const sent = body();
      const { revision } = (await enrol(sent)).body as PatientRecord;
      const petra = await makePerson(database, clinicId, ['therapist']);
      expect((await recordOf(sent.id)).revision).toBe(revision);
      const after = (await put(sent.id, changed(sent, petra))).body as PatientRecord;
      expect(after.revision).not.toBe(revision);
      expect((await putFrom(revision, named(sent, 'Ada Moreau'))).status).toBe(409);
    });

    it('takes the same change again, after an answer that was lost, as the same success', async () => {
      const sent = body();
      const { revision } = (await enrol(sent)).body as PatientRecord;
      const first = await putFrom(revision, named(sent, 'Ada Moreau'));
      const again = await putFrom(revision, named(sent, 'Ada Moreau'));
      expect(again.status).toBe(200);
      expect(again.body).toEqual(first.body);
      expect(await changesKept(sent.id)).toBe(1);
    });

    it('has to be named', async () => {
      const sent = body();
      await enrol(sent);
      const { identity, operation, careTeam } = sent;
      const answer = await desk.call('put', `/api/patients/${sent.id}`, { identity, operation, careTeam });
      expect(errorsOf(answer).map(({ field }) => field)).toEqual(['revision']);
    });
  });
});
