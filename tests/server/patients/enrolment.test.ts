import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
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
const countOf = async (table: string) =>
  (await database.asSuperuser.query(`select 1 from ${table} where clinic_id = $1`, [clinicId])).rowCount;
const errorsOf = (answer: { body: unknown }) => (answer.body as ProblemBody).errors ?? [];

describe('enrolling a patient', () => {
  it('writes person, record, card, team, consent and plan together, and the record shows them', async () => {
    const sent = body({ invite: 'not-yet' });
    const answer = await enrol(sent);
    expect(answer.status, answer.text).toBe(201);
    const record = answer.body as PatientRecord;
    expect(record).toMatchObject({
      id: sent.id,
      state: 'active',
      day: 5,
      leadName: 'Noor Haddad',
      mine: true,
      invitation: null,
      consent: { on: '2026-11-20', how: 'signed', recordedBy: 'Noor Haddad' },
      moves: ['pause', 'discharge', 'end'],
      caregivers: [],
      openFlags: 0,
    });
    expect(record.identity).toEqual({ ...sent.identity, phone: '(518) 555-0142' });
    expect(record.operation).toEqual(sent.operation);
    const { rows } = await database.asSuperuser.query(
      `select p.phone, p.time_zone, p.remind_at, r.role, plans.protocol_code
       from people p join person_roles r on r.person_id = p.id join plans on plans.patient_id = $1
       where p.id = $2`,
      [sent.id, record.personId],
    );
    expect(rows).toEqual([
      {
        phone: '+15185550142',
        time_zone: 'America/New_York',
        remind_at: '10:00',
        role: 'patient',
        protocol_code: 'reverse-replacement',
      },
    ]);
  });

  it.each([
    ['2026-11-30', 'active'],
    ['2026-12-01', 'planned'],
  ])(
    'of surgery on %s is %s, by the calendar of the patient and not of the server',
    async (surgeryDate, state) => {
      const answer = await enrol(body({ operation: { surgeryDate } }));
      expect(answer.body).toMatchObject({ state });
    },
  );

  it('invites by mail, by letter, or not yet', async () => {
    const invited = async (invite: 'email' | 'letter' | 'not-yet') =>
      ((await enrol(body({ invite }))).body as PatientRecord).invitation;
    expect(await invited('email')).toMatchObject({ state: 'open', byEmail: true });
    expect(await countOf('notifications')).toBe(1);
    expect(await invited('letter')).toMatchObject({ state: 'open', byEmail: false });
    expect(await countOf('notifications')).toBe(1);
    expect(await invited('not-yet')).toBeNull();
  });

  it('is the same patient when sent twice, also at once', async () => {
    const sent = body({ invite: 'email' });
    const answers = await Promise.all([enrol(sent), enrol(sent), enrol(sent)]);
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
    expect(await countOf('patients')).toBe(1);
    expect(await countOf('people')).toBe(2);
    expect(await countOf('notifications')).toBe(1);
  });

  it('is a conflict under the same id with other content, and changes nothing', async () => {
    const sent = body();
    await enrol(sent);
    const other = await enrol({ ...sent, operation: { ...sent.operation, arm: 'right' } });
    expect(other.body).toMatchObject({ type: 'urn:espalier:problem:id-conflict' });
    const { rows } = await database.asSuperuser.query(
      'select arm from operation_cards where patient_id = $1',
      [sent.id],
    );
    expect(rows).toEqual([{ arm: 'left' }]);
  });
});

describe('an enrolment that is not right', () => {
  it('is told everything that is wrong at once, and nothing is kept', async () => {
    const outsider = await makePerson(database, clinicId, ['billing']);
    const answer = await enrol(
      body({
        identity: { birthDate: '2026-12-02', phone: '12', email: noor.email },
        operation: { surgeryDate: '2029-01-01' },
        careTeam: [{ personId: outsider.personId, isLead: true }],
        consent: { on: '2026-12-01', how: 'spoken' },
      }),
    );
    expect(answer.status).toBe(422);
    expect(errorsOf(answer).map(({ field }) => field)).toEqual([
      'identity.birthDate',
      'operation.surgeryDate',
      'identity.phone',
      'identity.email',
      'careTeam',
      'consent.on',
    ]);
    for (const { message } of errorsOf(answer)) expect(message).toMatch(/^[A-Z].*\.$/u);
    expect(await countOf('patients')).toBe(0);
  });

  it('is told which field of the form is not right by its path', async () => {
    const sent = body();
    const answer = await enrol({
      ...sent,
      identity: { ...sent.identity, timeZone: 'Nowhere/Land', name: ' ' },
      operation: { ...sent.operation, dressingUntilDay: 61 },
      careTeam: [],
    });
    expect(errorsOf(answer).map(({ field }) => field)).toEqual([
      'identity.name',
      'identity.timeZone',
      'operation.dressingUntilDay',
      'careTeam',
      'careTeam',
    ]);
  });

  it.each([
    ['1906-11-29', true],
    ['1906-11-30', false],
  ])('takes nobody over 120 years old: born %s refused %s', async (birthDate, refused) => {
    const answer = await enrol(body({ identity: { birthDate } }));
    expect(answer.status).toBe(refused ? 422 : 201);
  });

  it.each([
    ['2024-11-29', true],
    ['2024-11-30', false],
    ['2028-11-30', false],
    ['2028-12-01', true],
  ])('takes no surgery over two years away: %s refused %s', async (surgeryDate, refused) => {
    const answer = await enrol(body({ operation: { surgeryDate } }));
    expect(answer.status).toBe(refused ? 422 : 201);
  });

  it('shares neither chart number nor address with anybody, however it is written, also when sent at once', async () => {
    const first = body();
    const second = body({
      identity: { chartNumber: first.identity.chartNumber, email: first.identity.email.toUpperCase() },
    });
    const answers = await Promise.all([enrol(first), enrol(second)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 422]);
    const refused = answers.find(({ status }) => status === 422)!;
    expect(errorsOf(refused).map(({ field }) => field)).toEqual(['identity.email', 'identity.chartNumber']);
  });

  it('names nobody of another clinic', async () => {
    const there = await makeClinic(database);
    const foreign = await makePerson(database, there, ['therapist']);
    const answer = await enrol(body({ careTeam: [{ personId: foreign.personId, isLead: true }] }));
    expect(errorsOf(answer).map(({ field }) => field)).toEqual(['careTeam']);
    const same = body({ identity: { email: foreign.email } });
    expect((await enrol(same)).status).toBe(201);
  });
});
