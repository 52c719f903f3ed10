import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { FlagCase, MorningRound } from '#shared/triage/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';

let database: TestDatabase;
let web: TestWeb;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

it('carries a fall from the phone to the round, and the reply back to the phone', async () => {
  const clinicId = await makeClinic(database);
  const noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  const tobias = await makePatient(database, clinicId, { name: 'Tobias Ahlgren', lead: noor });
  const phone = await web.signIn(tobias);
  const desk = await web.signIn(noor);
  const deskSocket = await desk.socket();
  const phoneSocket = await phone.socket();

  const at = new Date().toISOString();
  const sent = await phone.call('post', '/api/check-ins', {
    id: randomUUID(),
    kind: 'daily',
    answers: { painNow: 8, painWorst: 9, symptoms: ['fall'], fallSigns: ['on-arm', 'hurts-more'] },
    answeredAt: at,
    sentAt: at,
    rulesVersion: 'shipped-1',
  });
  expect(sent.status, sent.text).toBe(201);

  const evaluated = await sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);
  expect(evaluated).toBe(1);
  await deskSocket.nextHint(({ topic }) => topic === 'flags');

  const round = (await desk.call('get', '/api/flags')).body as MorningRound;
  expect(round.flags).toHaveLength(1);
  const flag = round.flags[0]!;
  expect(flag).toMatchObject({ urgency: 'urgent', patient: { name: 'Tobias Ahlgren' } });

  expect((await desk.call('post', `/api/flags/${flag.id}/seen`)).status).toBe(204);
  const opened = (await desk.call('get', `/api/flags/${flag.id}`)).body as FlagCase;
  expect(opened.reasons.length).toBeGreaterThan(0);

  const reply = await desk.call('post', `/api/flags/${flag.id}/replies`, {
    id: randomUUID(),
    text: 'Please keep the sling on. I will ring you.',
  });
  expect(reply.status, reply.text).toBe(201);
  await phoneSocket.nextHint(({ topic }) => topic === 'thread');

  const closed = await desk.call('post', `/api/flags/${flag.id}/close`, {
    outcome: 'advised-by-phone',
    worthRaising: 'yes',
    note: '',
  });
  expect(closed.status, closed.text).toBe(200);
});
