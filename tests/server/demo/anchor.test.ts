import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { rulesVersion } from '#shared/red-flags/rules/shipped.ts';
import { demoClinicId } from '#server/demo/clinic.ts';
import { patientIdOf, personIdOf } from '#server/demo/patients.ts';
import { staffId } from '#server/demo/staff.ts';
import { submitCheckIn } from '#server/features/check-ins/service.ts';
import { addMessage } from '#server/features/threads/service.ts';
import { close } from '#server/features/triage/work.ts';
import { plantWholeClinic } from '../whole-clinic.ts';
import { asPerson, demoDatabase, rowsOf, type DemoDatabase } from './demo.ts';

/** 12:00 in the clinic on the Friday before clocks go back: in New York on Sunday 1 November 2026. */
const friday = new Date('2026-10-30T16:00:00Z');
/** 17:30 there, by summer time. */
const fridayAfternoon = new Date('2026-10-30T21:30:00Z');
/** 18:00 there on Tuesday, by winter time. */
const tuesday = new Date('2026-11-03T23:00:00Z');
/** 17:30 there, an hour of universal time later than by summer time. */
const movedAfternoon = new Date('2026-11-03T22:30:00Z');

let demo: DemoDatabase;
let otherClinicId: string;
let flagId: string;

type Rows = Awaited<ReturnType<typeof rowsOf>>;
let before: { demo: Rows; sameDay: Rows; other: Rows; times: Times; birthDates: object[] };

const query = async <Row extends object>(text: string): Promise<Row[]> =>
  (await demo.asSuperuser.query<Row>(text)).rows;

type Times = Record<string, (string | null)[]>;

/** Every date and instant of the demo by column, as local text so many days back; found by the catalogue. */
const localTimes = async (daysBack: number): Promise<Times> => {
  const columns = await query<{ table: string; column: string; local: string }>(`
    select c.table_name as table, c.column_name as column,
      c.column_name || case when c.data_type = 'date' then '' else ' at time zone ''America/New_York''' end as local
    from information_schema.columns c join pg_class t on t.relname = c.table_name and t.relrowsecurity
    where c.table_schema = 'public' and c.data_type in ('date', 'timestamp with time zone')
      and c.table_name <> 'clinics' and c.column_name <> 'birth_date'
    order by 1, 2`);
  const found: Times = {};
  for (const { table, column, local } of columns) {
    const { rows } = await demo.asSuperuser.query<{ at: string | null }>(
      `select ((${local}) - make_interval(days => $2))::text as at from ${table} where clinic_id = $1 order by 1`,
      [demoClinicId, daysBack],
    );
    found[`${table}.${column}`] = rows.map(({ at }) => at);
  }
  return found;
};

const birthDates = () => query('select id, birth_date::text from patients order by id');

/** On Friday afternoon Ines checks in, and Noor closes a flag and answers a thread. */
const useDemo = async (): Promise<void> => {
  const at = fridayAfternoon.toISOString();
  await asPerson(demo, personIdOf('Ines Valcourt'), (tx, actor) =>
    submitCheckIn(
      tx,
      actor,
      { id: randomUUID(), kind: 'daily', answers: { painNow: 3 }, answeredAt: at, sentAt: at, rulesVersion },
      fridayAfternoon,
    ),
  );
  const outcome = { outcome: 'no-action-needed', worthRaising: 'no', note: 'Overdid it.' } as const;
  const [thread] = await query<{ id: string }>(`select id from threads where subject = 'Ball or table?'`);
  await asPerson(demo, staffId('noor'), async (tx, actor) => {
    await close(tx, actor, { flagId, ...outcome }, fridayAfternoon);
    const message = { threadId: thread!.id, id: randomUUID(), text: 'A pillowcase is fine.' };
    await addMessage(tx, actor, message, fridayAfternoon);
  });
};

beforeAll(async () => {
  demo = await demoDatabase();
  otherClinicId = (await plantWholeClinic(demo)).clinicId;
  await demo.act('fill', friday);
  const [open] = await query<{ id: string }>(
    `select id from flags where state = 'open' and patient_id = '${patientIdOf('Rukmini Dass')}'`,
  );
  flagId = open!.id;
  await useDemo();
  const asUsed = await rowsOf(demo, demoClinicId);
  await demo.act('re-anchor', fridayAfternoon);
  before = {
    demo: asUsed,
    sameDay: await rowsOf(demo, demoClinicId),
    other: await rowsOf(demo, otherClinicId),
    times: await localTimes(0),
    birthDates: await birthDates(),
  };
  await demo.act('re-anchor', tuesday);
});

afterAll(() => demo.drop());

test('a demo of today is left as it is', () => {
  expect(before.sameDay).toEqual(before.demo);
});

test('a demo of Friday is of today on Tuesday: dates four days on, times of day as they were, over a clock change', async () => {
  expect(Object.keys(before.times).length).toBeGreaterThan(20);
  expect(await localTimes(4)).toEqual(before.times);
  expect(
    await query(`select max(local_date)::text as date from check_ins where clinic_id = '${demoClinicId}'`),
  ).toEqual([{ date: '2026-11-03' }]);
});

test('what users have added moves too, and stays what it was', async () => {
  expect(
    await query(`select received_at, local_date::text, answers from check_ins
      where author_id = '${personIdOf('Ines Valcourt')}' order by received_at desc limit 1`),
  ).toEqual([{ received_at: movedAfternoon, local_date: '2026-11-03', answers: { painNow: 3 } }]);
  expect(
    await query(`select closed_at, outcome, (select e.note from flag_events e where e.flag_id = flags.id and e.kind = 'closed') as outcome_note
      from flags where id = '${flagId}'`),
  ).toEqual([{ closed_at: movedAfternoon, outcome: 'no-action-needed', outcome_note: 'Overdid it.' }]);
  expect(await query(`select sent_at from messages where text = 'A pillowcase is fine.'`)).toEqual([
    { sent_at: movedAfternoon },
  ]);
});

test('birth dates stay', async () => {
  expect(await birthDates()).toEqual(before.birthDates);
});

test('words that name a day move with it', async () => {
  expect(
    await query(`select subject from threads t join flags f on f.id = t.flag_id where f.state = 'claimed'`),
  ).toEqual([{ subject: 'Your check-in on November 3' }]);
  const notes = await query<{ text: string }>(
    `select text from messages where kind = 'note' and sent_at between '2026-11-03T05:00:00Z' and '2026-11-03T13:00:00Z'`,
  );
  expect(notes.length).toBeGreaterThan(0);
  for (const { text } of notes) expect(text).toMatch(/opens Tuesday 08:00/);
});

test('another clinic is not touched', async () => {
  expect(await rowsOf(demo, otherClinicId)).toEqual(before.other);
});

test('a demo that has been moved already is left as it is', async () => {
  const moved = await rowsOf(demo, demoClinicId);
  await demo.act('re-anchor', tuesday);
  expect(await rowsOf(demo, demoClinicId)).toEqual(moved);
});

test('moved early on a day, nothing lies in the future, what came first is first, and what was over stays as it was', async () => {
  const order = `select id from check_ins where clinic_id = '${demoClinicId}' order by answered_at, id`;
  const inOrder = await query(order);
  // 07:30 in the clinic on Thursday.
  await demo.act('re-anchor', new Date('2026-11-05T12:30:00Z'));
  const later = Object.entries(await localTimes(0)).flatMap(([column, times]) =>
    times.filter((at) => at !== null && at > '2026-11-05 07:30:00').map((at) => [column, at]),
  );
  // An invitation is still open, something waits to be sent, somebody is expected back, help has a last day, and
  // one patient's surgery is to come: these lie ahead by what they are.
  const ahead = [
    ...['invitations.expires_at', 'notifications.due_at', 'patient_state_changes.back_on'],
    ...['caregivers.until_date', 'operation_cards.surgery_date'],
  ];
  expect(later.filter(([column]) => !ahead.includes(String(column)))).toEqual([]);
  expect(
    await query(`select i.id from invitations i join one_time_tokens t on t.id = i.id
      where t.expires_at <> i.expires_at`),
  ).toEqual([]);
  expect(await query(order)).toEqual(inOrder);
  const breakfast = `select to_char(answered_at at time zone 'America/New_York', 'HH24:MI') as at
    from check_ins where author_id = '${personIdOf('Anselm Okwuosa')}' and local_date = '2026-11-05'`;
  expect(await query(breakfast)).toEqual([{ at: '06:50' }]);
});

test('another clinic is not touched either where the owner could pass row security', async () => {
  await demo.actAsSuperuser('re-anchor', new Date('2026-11-09T23:00:00Z'));
  expect(await rowsOf(demo, otherClinicId)).toEqual(before.other);
  expect(
    await query(`select max(local_date)::text as date from check_ins where clinic_id = '${demoClinicId}'`),
  ).toEqual([{ date: '2026-11-09' }]);
});

test('without a demo clinic there is nothing to move', async () => {
  const empty = await demoDatabase();
  try {
    await empty.act('re-anchor', tuesday);
    const { rows } = await empty.asSuperuser.query('select count(*)::int as n from clinics');
    expect(rows).toEqual([{ n: 0 }]);
  } finally {
    await empty.drop();
  }
});
