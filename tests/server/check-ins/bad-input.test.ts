import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ProblemBody } from '#shared/problems/problems.ts';
import { makeClinic, makePatient } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { alertBody, checkInBody } from './bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let phone: TestBrowser;
let before: unknown;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  phone = await web.signIn(await makePatient(database, await makeClinic(database)));
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const stored = async () => {
  const { rows } = await database.asSuperuser.query(
    `select (select count(*) from check_ins) as check_ins, (select count(*) from alerts) as alerts,
       (select count(*) from jobs.job) as jobs, (select count(*) from audit_entries) as audit`,
  );
  return rows[0] as unknown;
};

beforeEach(async () => {
  before = await stored();
});

const fieldsOf = (body: unknown): string[] =>
  ((body as ProblemBody).errors ?? []).map(({ field }) => field).sort();

const withAnswers = (answers: Record<string, unknown>) => ({ ...checkInBody(), answers });

describe('a check-in that is not right is refused with the field named, and nothing is stored:', () => {
  it.each<[what: string, body: unknown, fields: string[]]>([
    ['pain 11', withAnswers({ painNow: 11 }), ['answers.painNow']],
    ['pain below none', withAnswers({ painWorst: -1 }), ['answers.painWorst']],
    ['half a point of pain', withAnswers({ painNow: 2.5 }), ['answers.painNow']],
    ['pain in words', withAnswers({ painNow: '4' }), ['answers.painNow']],
    ['an unknown symptom', withAnswers({ symptoms: ['fall', 'hiccups'] }), ['answers.symptoms.1']],
    ['an unknown danger sign', withAnswers({ danger: ['doom'] }), ['answers.danger.0']],
    ['an unknown answer', withAnswers({ painNow: 1, mood: 'fine' }), ['answers.mood']],
    ['an unknown key beside them', { ...checkInBody(), patientId: 'x' }, ['patientId']],
    ['200 kB of note', withAnswers({ note: 'n'.repeat(200_000) }), ['answers.note']],
    ['a note with a zero byte', withAnswers({ note: 'before\u0000after' }), ['answers.note']],
    ['a note with half a character', withAnswers({ note: 'broken \ud83d' }), ['answers.note']],
    ['a version with a zero byte', { ...checkInBody(), rulesVersion: '\u0000' }, ['rulesVersion']],
    ['an id that is none', { ...checkInBody(), id: '1' }, ['id']],
    ['a time that is none', { ...checkInBody(), answeredAt: 'this morning' }, ['answeredAt']],
    [
      'an impossible temperature',
      withAnswers({ temperature: { unit: 'C', tenths: 990 } }),
      ['answers.temperature.tenths'],
    ],
    ['no answers at all', { ...checkInBody(), answers: undefined }, ['answers']],
    [
      'two mistakes at once',
      withAnswers({ painNow: 11, swelling: 'huge' }),
      ['answers.painNow', 'answers.swelling'],
    ],
  ])('%s', async (_what, body, fields) => {
    const answer = await phone.call('post', '/api/check-ins', body);
    expect(answer.status, answer.text).toBe(422);
    expect(answer.headers.get('content-type')).toContain('application/problem+json');
    expect(fieldsOf(answer.body)).toEqual(fields);
    expect(await stored()).toEqual(before);
  });

  it('an empty body names every field that is missing', async () => {
    const answer = await phone.call('post', '/api/check-ins', {});
    expect(answer.status).toBe(422);
    expect(fieldsOf(answer.body)).toEqual(['answeredAt', 'answers', 'id', 'kind', 'rulesVersion', 'sentAt']);
  });

  it('an alert with an unknown danger sign', async () => {
    const body = { ...alertBody(), answers: { danger: ['doom'] } };
    const answer = await phone.call('post', '/api/alerts', body);
    expect([answer.status, fieldsOf(answer.body)]).toEqual([422, ['answers.danger.0']]);
    expect(await stored()).toEqual(before);
  });
});

describe('a request that cannot be read is a problem with a plain title, and nothing is stored:', () => {
  const problem = async (body: string, headers: Record<string, string> = {}) => {
    const answer = await phone.call('post', '/api/check-ins', body, headers);
    expect(answer.headers.get('content-type')).toContain('application/problem+json');
    expect(await stored()).toEqual(before);
    return [answer.status, (answer.body as ProblemBody).type];
  };

  it('malformed JSON', async () => {
    expect(await problem('{"id": ')).toEqual([400, 'urn:espalier:problem:malformed-request']);
    expect(await problem('"just a word"')).toEqual([400, 'urn:espalier:problem:malformed-request']);
  });

  it('600 kB', async () => {
    const body = JSON.stringify(withAnswers({ note: 'n'.repeat(600_000) }));
    expect(await problem(body)).toEqual([413, 'urn:espalier:problem:too-large']);
  });

  it('JSON nested a hundred thousand deep', async () => {
    const [status] = await problem(`{"answers":${'['.repeat(100_000)}${']'.repeat(100_000)}}`);
    expect([400, 422]).toContain(status);
  });

  it('what says it is compressed and is not', async () => {
    expect(await problem('{}', { 'content-encoding': 'gzip' })).toEqual([
      400,
      'urn:espalier:problem:malformed-request',
    ]);
  });

  it('a small body that unpacks to a huge one', async () => {
    const answer = await fetch(`${web.url}/api/check-ins`, {
      method: 'POST',
      headers: {
        origin: web.url,
        cookie: phone.cookie,
        'content-type': 'application/json',
        'content-encoding': 'gzip',
        'x-espalier-session': phone.me!.writeToken,
      },
      body: gzipSync(JSON.stringify(withAnswers({ note: 'n'.repeat(20_000_000) }))),
    });
    expect(answer.status).toBe(413);
    expect(await stored()).toEqual(before);
  });
});

describe('an address that names nothing is not there, and no failure of the server:', () => {
  it.each(['not-an-id', '%00', '%EF%BF%BD', 'x'.repeat(4000)])('/api/alerts/%s', async (id) => {
    const answer = await phone.call('get', `/api/alerts/${id}`);
    expect([answer.status, (answer.body as ProblemBody).type]).toEqual([
      404,
      'urn:espalier:problem:not-found',
    ]);
  });

  it('what was typed there stays out of the audit', async () => {
    await phone.call('get', '/api/alerts/Marguerite%20Oyelaran');
    const { rows } = await database.asSuperuser.query(
      `select detail from audit_entries where action = 'access.denied' order by at desc limit 1`,
    );
    expect(rows).toEqual([{ detail: { route: 'get /api/alerts/:alertId', alertId: 'not an id' } }]);
  });

  it.each(['%zz', '%E0%A4%A'])('/api/alerts/%s cannot even be read', async (id) => {
    expect((await phone.call('get', `/api/alerts/${id}`)).status).toBe(400);
  });
});
