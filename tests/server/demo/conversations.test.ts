import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { personIdOf } from '#server/demo/patients.ts';
import { staffId } from '#server/demo/staff.ts';
import { readMessages } from '#server/features/threads/service.ts';
import { startThread } from '#server/features/threads/starting.ts';
import { reply } from '#server/features/triage/work.ts';
import { asPerson, demoDatabase, type DemoDatabase } from './demo.ts';

/** A Tuesday, 10:50 in the clinic. */
const now = new Date('2026-12-01T15:50:00Z');
let demo: DemoDatabase;

type Thread = {
  id: string;
  name: string;
  subject: string;
  state: string;
  flag: string | null;
  last: number;
  sequences: number[];
  last_side: string;
  times_ordered: boolean;
  dates_right: boolean;
};
let threads: Thread[];

beforeAll(async () => {
  demo = await demoDatabase();
  await demo.act('fill', now);
  const { rows } = await demo.asSuperuser.query<Thread>(`
    select t.id, p.name, t.subject, t.state, t.flag_id as flag, t.last_sequence as last,
      (select array_agg(sequence order by sequence) from messages m where m.thread_id = t.id) as sequences,
      (select author_side from messages m where m.thread_id = t.id and kind = 'message' order by sequence desc limit 1) as last_side,
      not exists (select 1 from messages a join messages b on b.thread_id = a.thread_id and b.sequence = a.sequence + 1
        where a.thread_id = t.id and b.sent_at < a.sent_at) as times_ordered,
      t.last_at = (select max(sent_at) from messages m where m.thread_id = t.id)
        and t.created_at = (select min(sent_at) from messages m where m.thread_id = t.id) as dates_right
    from threads t join patients a on a.id = t.patient_id join people p on p.id = a.person_id`);
  threads = rows;
});

afterAll(() => demo.drop());

test('every thread counts its messages from 1 without a gap, in the order of time', () => {
  for (const thread of threads) {
    expect(thread.sequences, thread.subject).toEqual(
      Array.from({ length: thread.last }, (_, index) => index + 1),
    );
    expect(thread, thread.subject).toMatchObject({ times_ordered: true, dates_right: true });
  }
});

test('there are threads in every state, each as its last message left it', () => {
  for (const { state, last_side, subject } of threads) {
    if (state !== 'closed') {
      expect(state, subject).toBe(last_side === 'patient' ? 'waiting-on-us' : 'waiting-on-patient');
    }
  }
  for (const state of ['waiting-on-us', 'waiting-on-patient', 'closed']) {
    expect(threads.filter((thread) => thread.state === state).length, state).toBeGreaterThan(2);
  }
});

test('the threads of the scenario are there, a long one and some about flags', () => {
  const of = (name: string) => threads.filter((thread) => thread.name === name && thread.flag === null);
  expect(of('Ines Valcourt')).toMatchObject([{ subject: 'Damp dressing', state: 'closed' }]);
  expect(of('Marguerite Oyelaran')).toMatchObject([{ subject: 'Ball or table?', state: 'waiting-on-us' }]);
  expect(of('Soledad Quiroga')).toMatchObject([
    { subject: 'Sleeping in the recliner', state: 'waiting-on-us' },
  ]);
  expect(of('Hal Brandvold')).toMatchObject([{ subject: 'Next visit', state: 'closed' }]);
  expect(Math.max(...threads.map(({ last }) => last))).toBeGreaterThanOrEqual(60);
  expect(threads.filter(({ flag }) => flag !== null).length).toBeGreaterThan(3);
});

test('everybody who wrote takes part, on the right side, and nobody has seen more than there is', async () => {
  const { rows } = await demo.asSuperuser.query(`
    select m.thread_id from messages m left join thread_participants p
      on p.thread_id = m.thread_id and p.person_id = m.author_id and p.side = m.author_side and p.seen_sequence >= m.sequence
    where m.kind = 'message' and p.person_id is null
    union all
    select p.thread_id from thread_participants p join threads t on t.id = p.thread_id
    where p.seen_sequence > t.last_sequence or (p.seen_sequence > 0) <> (p.seen_at is not null)
    union all
    select t.id from threads t join patients a on a.id = t.patient_id where not exists (
      select 1 from thread_participants p where p.thread_id = t.id and p.person_id = a.person_id and p.side = 'patient')`);
  expect(rows).toEqual([]);
});

test('the note of the closed clinic reads as the product writes it at that time', async () => {
  const { rows: notes } = await demo.asSuperuser.query<{ text: string; sent_at: Date }>(
    `select text, sent_at from messages where kind = 'note'`,
  );
  expect(notes.length).toBeGreaterThan(2);
  for (const note of notes) {
    const message = { id: randomUUID(), text: 'Is anybody there?' };
    const written = await asPerson(demo, personIdOf('Ines Valcourt'), async (tx, actor) => {
      const thread = await startThread(
        tx,
        actor,
        { id: randomUUID(), subject: 'Closed?', message },
        note.sent_at,
      );
      return readMessages(tx, actor, thread.id, 0);
    });
    expect(written.messages.map(({ kind, text }) => [kind, text])).toEqual([
      ['message', 'Is anybody there?'],
      ['note', note.text],
    ]);
  }
});

test('a thread about a flag has the subject that the product gives it', async () => {
  const { rows: flags } = await demo.asSuperuser.query<{ id: string; subject: string }>(
    `select f.id, t.subject from flags f join threads t on t.flag_id = f.id
       join patients p on p.id = f.patient_id where p.state <> 'discharged'`,
  );
  await demo.asSuperuser.query(
    'update threads set flag_id = null, client_id = gen_random_uuid() where flag_id is not null',
  );
  for (const { id, subject } of flags) {
    await asPerson(demo, staffId('noor'), (tx, actor) =>
      reply(tx, actor, { flagId: id, id: randomUUID(), text: 'Noted.' }, now),
    );
    const { rows } = await demo.asSuperuser.query('select subject from threads where flag_id = $1', [id]);
    expect(rows).toEqual([{ subject }]);
  }
});
