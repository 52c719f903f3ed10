import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { importColumns, type ImportPreview } from '#shared/patients/import-contract.ts';
import type { ProblemBody } from '#shared/problems/problems.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { listOf, rowOf } from './bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;

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
  desk = await web.signIn(noor);
});

const preview = async (text: string) =>
  (await desk.call('post', '/api/patient-imports/preview', { text })).body as ImportPreview;
const send = (text: string, invite: 'email' | 'not-yet' = 'not-yet') =>
  desk.call('post', '/api/patient-imports', { text, invite });
const countOf = async (table: string) =>
  (await database.asSuperuser.query(`select 1 from ${table} where clinic_id = $1`, [clinicId])).rowCount;
const errorsIn = async (changes: Parameters<typeof rowOf>[1]) =>
  (await preview(listOf([rowOf(noor, changes)]))).rows[0]?.errors;

describe('a pasted list', () => {
  it.each([
    ['commas', { separator: ',' }],
    ['semicolons', { separator: ';' }],
    ['tabs, as from a spreadsheet', { separator: '\t' }],
    ['line ends of another system', { lineEnd: '\r\n' }],
  ])('is read with %s', async (_name, form) => {
    const found = await preview(listOf([rowOf(noor), rowOf(noor)], form));
    expect(found.problems).toEqual([]);
    expect(found.rows.map(({ line, lead, errors }) => ({ line, lead, errors }))).toEqual([
      { line: 2, lead: 'Noor Haddad', errors: [] },
      { line: 3, lead: 'Noor Haddad', errors: [] },
    ]);
    expect(found.ready).toBe(2);
  });

  it('may begin with a byte order mark, name its columns as people do, and leave lines empty', async () => {
    const [header, ...rows] = listOf([rowOf(noor), rowOf(noor)]).split('\n');
    const named = header!.replaceAll('_', ' ').toUpperCase();
    const found = await preview(`\uFEFF${[named, rows[0], '', rows[1], ''].join('\n')}`);
    expect(found.problems).toEqual([]);
    expect(found.rows.map(({ line }) => line)).toEqual([2, 4]);
  });

  // The line breaks inside a quoted cell are those of RFC 4180, section 2, rule 6.
  it('counts lines as they stand in what was pasted, also after a cell of several lines', async () => {
    const rows = [rowOf(noor, { address: '4 Quince Lane\nLarkmoor' }), rowOf(noor, { name: '' })];
    const found = await preview(listOf(rows));
    expect(found.rows.map(({ line }) => line)).toEqual([2, 4]);
    expect(found.rows[1]?.errors).toEqual([{ column: 'name', message: 'Enter a name.' }]);
  });

  it('says which columns are unknown, missing or there twice, before it looks at any row', async () => {
    const columns = [
      ...importColumns.filter((name) => name !== 'surgeon' && name !== 'limits'),
      'shoe',
      'arm',
    ];
    const found = await preview(listOf([rowOf(noor)], { columns }));
    expect(found).toEqual({
      rows: [],
      problems: [
        'The column "shoe" is not known.',
        'The column "arm" is there twice.',
        'The column "surgeon" is missing.',
      ],
      ready: 0,
    });
  });

  it('is refused as a whole where it has too many rows, none, or an open quotation mark', async () => {
    const many = listOf(Array.from({ length: 501 }, () => rowOf(noor)));
    expect((await preview(many.slice(0, 299_000))).problems).toHaveLength(1);
    expect((await preview(listOf([]))).problems).toEqual(['There is no row below the column names.']);
    expect((await preview(`${listOf([rowOf(noor)])}\n"open`)).problems).toEqual([
      'Line 3: a quotation mark is not closed.',
    ]);
  });
});

describe('the rows of a list', () => {
  it('are told what is not right in the words of the form, by column', async () => {
    expect(
      await errorsIn({
        email: 'nobody',
        birth_date: '',
        dominant_hand: 'both',
        surgery_date: '03/04/2026',
        dressing_until_day: '99',
        block: 'unknown',
        lead_email: 'elsewhere@people.example',
        consent_how: 'written',
      }),
    ).toEqual([
      { column: 'email', message: 'That is not an e-mail address.' },
      { column: 'birth_date', message: 'Enter the date of birth.' },
      { column: 'dominant_hand', message: 'Choose the dominant hand.' },
      { column: 'surgery_date', message: 'Write dates as 2026-03-04.' },
      { column: 'block', message: 'Choose the nerve block.' },
      { column: 'dressing_until_day', message: 'Sixty days at most.' },
      { column: 'consent_how', message: 'Choose how the patient agreed.' },
      { column: 'lead_email', message: 'No clinician who works for the clinic now has this e-mail address.' },
    ]);
  });

  it('are held to the calendar and the telephone as the form is', async () => {
    const columns = (
      await errorsIn({ birth_date: '2999-01-01', surgery_date: '2999-01-01', phone: '12' })
    )?.map(({ column }) => column);
    expect(columns).toEqual(['birth_date', 'surgery_date', 'phone']);
  });

  it('name each other where two have the same chart number or address', async () => {
    const first = rowOf(noor);
    const found = await preview(
      listOf([first, rowOf(noor, { chart_number: first.chart_number }), rowOf(noor, { email: first.email })]),
    );
    expect(found.rows.map(({ errors }) => errors)).toEqual([
      [
        { column: 'chart_number', message: 'Line 3 has the same.' },
        { column: 'email', message: 'Line 4 has the same.' },
      ],
      [{ column: 'chart_number', message: 'Line 2 has the same.' }],
      [{ column: 'email', message: 'Line 2 has the same.' }],
    ]);
    expect(found.ready).toBe(0);
  });

  it('may write choices as people do', async () => {
    expect(await errorsIn({ procedure: 'Reverse replacement', block: 'Long acting', arm: 'LEFT' })).toEqual(
      [],
    );
  });

  it.each(['=1+1', '+SUM(A1)', '-2', '@cmd'])('keep %s as the text it is', async (allergies) => {
    expect((await send(listOf([rowOf(noor, { allergies })]))).status).toBe(201);
    const { rows } = await database.asSuperuser.query('select allergies from patients where clinic_id = $1', [
      clinicId,
    ]);
    expect(rows).toEqual([{ allergies }]);
  });
});

describe('enrolling a list', () => {
  it('enrols every row with team, plan and, where asked for, the invitation, and each is on record', async () => {
    const answer = await send(listOf([rowOf(noor), rowOf(noor), rowOf(noor)]), 'email');
    expect(answer.status, answer.text).toBe(201);
    expect(answer.body).toEqual({ enrolled: 3, alreadyEnrolled: 0 });
    for (const table of ['patients', 'operation_cards', 'care_team_members', 'plans', 'invitations']) {
      expect(await countOf(table), table).toBe(3);
    }
    const { rows } = await database.asSuperuser.query(
      `select 1 from audit_entries where clinic_id = $1 and action = 'patient.enrolled'`,
      [clinicId],
    );
    expect(rows).toHaveLength(3);
  });

  it('enrols none where one row is not right, and says which', async () => {
    const answer = await send(listOf([rowOf(noor), rowOf(noor, { phone: '12' })]));
    expect(answer.status).toBe(422);
    expect((answer.body as ProblemBody).errors).toMatchObject([{ field: 'rows.3.phone' }]);
    expect(await countOf('patients')).toBe(0);
    expect(await countOf('people')).toBe(1);
  });

  it('enrols once when sent twice, also at once, and adds what is new to a longer list', async () => {
    const rows = [rowOf(noor), rowOf(noor)];
    const answers = await Promise.all([send(listOf(rows)), send(listOf(rows))]);
    expect(answers.map(({ body }) => (body as { enrolled: number }).enrolled).sort()).toEqual([0, 2]);
    const longer = await send(listOf([...rows, rowOf(noor)]));
    expect(longer.body).toEqual({ enrolled: 1, alreadyEnrolled: 2 });
    expect(await countOf('patients')).toBe(3);
  });

  it('leaves out who is enrolled, and refuses who shares only the number or only the address with somebody', async () => {
    const row = rowOf(noor);
    await send(listOf([row]));
    const found = await preview(listOf([row, rowOf(noor, { email: noor.email })]));
    expect(found.rows.map(({ alreadyEnrolled }) => alreadyEnrolled)).toEqual([true, false]);
    expect(found.rows[1]?.errors).toMatchObject([{ column: 'email' }]);
    expect(await errorsIn({ chart_number: row.chart_number })).toEqual([
      { column: 'chart_number', message: 'Another patient has this chart number.' },
    ]);
  });

  it('takes 500 rows at once', async () => {
    const columns = importColumns.filter((name) => !['allergies', 'limits', 'tuberosity'].includes(name));
    const text = listOf(
      Array.from({ length: 500 }, () => rowOf(noor)),
      { columns },
    ).replaceAll('"', '');
    const bare = text
      .replaceAll('Larkmoor', '')
      .replaceAll(', 518-555-0143', '')
      .replaceAll('Lane, ', 'Lane');
    expect(bare.length).toBeLessThan(300_000);
    const answer = await send(bare);
    expect(answer.body).toEqual({ enrolled: 500, alreadyEnrolled: 0 });
  }, 60_000);
});
