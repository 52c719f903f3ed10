import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { makeClinic, makePatient, makePerson } from '#tests/support/clinic.ts';
import { cloneDatabase, prepareTemplate, silentLog } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { startWeb } from '#tests/support/web.ts';
import { startWork } from '#workers/work.ts';

/**
 * From the tap on "Send" to the hint in an open morning round, with a worker, beside the bare way through the
 * same database: insert, NOTIFY, LISTEN. One after the other, at rest.
 */
const rounds = Number(process.env.BENCH_ROUNDS ?? 100);

const percentile = (sorted: number[], share: number): number =>
  sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? Number.NaN;

const measure = async (once: () => Promise<void>): Promise<{ median: number; p95: number }> => {
  for (let warmUp = 0; warmUp < 5; warmUp += 1) await once();
  const times: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const startedAt = performance.now();
    await once();
    times.push(performance.now() - startedAt);
  }
  times.sort((a, b) => a - b);
  return { median: percentile(times, 0.5), p95: percentile(times, 0.95) };
};

const superUrl = process.env.TEST_SUPER_URL;
if (!superUrl) throw new Error('Run it as `npm run bench`.');
await prepareTemplate(superUrl);
const database = await cloneDatabase();
const web = await startWeb(database);
const nowhere = { send: () => Promise.resolve({ providerId: null }), close: () => undefined };
const work = await startWork({
  databaseUrl: database.urls.app,
  tools: {
    pools: database.pools,
    channels: { email: nowhere, push: nowhere, sms: nowhere, phone: nowhere },
    tokenSecret: testSecrets.tokenSecret,
  },
  clock: () => new Date(),
  log: silentLog,
});

const clinicId = await makeClinic(database);
const therapist = await makePerson(database, clinicId, ['therapist']);
const patient = await makePatient(database, clinicId, { lead: therapist });
const phone = await web.signIn(patient);
const desk = await (await web.signIn(therapist)).socket();

const product = await measure(async () => {
  const seenBefore = desk.hints.length;
  const at = new Date().toISOString();
  const arrived = desk.nextHint((hint) => hint.topic === 'flags' && desk.hints.indexOf(hint) >= seenBefore);
  const sent = await phone.call('post', '/api/check-ins', {
    id: randomUUID(),
    kind: 'daily',
    answers: { painNow: 8, painWorst: 8, symptoms: ['fall'], fallSigns: ['on-arm'] },
    answeredAt: at,
    sentAt: at,
    rulesVersion: 'bench',
  });
  if (sent.status !== 201) throw new Error(`Refused: ${sent.text}`);
  await arrived;
});

const listener = new pg.Client({ connectionString: database.urls.app });
await listener.connect();
await listener.query('listen bench');
await database.asSuperuser.query('create table bench (id uuid primary key, body jsonb)');
const bare = await measure(async () => {
  const arrived = new Promise<void>((resolve) => listener.once('notification', () => resolve()));
  const client = await database.asSuperuser.connect();
  try {
    await client.query('begin');
    await client.query('insert into bench values ($1, $2)', [randomUUID(), { painNow: 8 }]);
    await client.query(`select pg_notify('bench', '')`);
    await client.query('commit');
  } finally {
    client.release();
  }
  await arrived;
});

const ms = (value: number) => `${value.toFixed(1)} ms`;
process.stdout.write(
  [
    `Check-in sent to hint in the round: median ${ms(product.median)}, 95th percentile ${ms(product.p95)} (${rounds} rounds)`,
    `Bare insert, NOTIFY, LISTEN:        median ${ms(bare.median)}, 95th percentile ${ms(bare.p95)}`,
    `Ratio of the medians: ${(product.median / bare.median).toFixed(1)}`,
    `Under a second at rest: ${product.p95 < 1000 ? 'yes' : 'NO'}`,
    '',
  ].join('\n'),
);
if (product.p95 >= 1000) process.exitCode = 1;

await listener.end();
await work.stop();
await web.stop();
await database.drop();
