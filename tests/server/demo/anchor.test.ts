import { randomUUID } from 'node:crypto';
import { afterEach, beforeEach, expect, test } from 'vitest';
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

let demo: DemoDatabase;

beforeEach(async () => {
  demo = await demoDatabase();
  await demo.act('fill', friday);
});

afterEach(() => demo.drop());

/** Every date and instant of the demo by column, as local text so many days back; found by the catalogue. */
const localTimes = async (daysBack: number): Promise<Record<string, (string | null)[]>> => {
  const { rows: columns } = await demo.asSuperuser.query<{ table: string; column: string }>(`
    select c.table_name as table, c.column_name as column from information_schema.columns c
      join pg_class t on t.relname = c.table_name and t.relrowsecurity
    where c.table_schema = 'public' and c.data_type in ('date', 'timestamp with time zone')
      and c.table_name <> 'clinics' and c.column_name <> 'birth_date'
    order by 1, 2`);
  const found: Record<string, (string | null)[]> = {};
  for (const { table, column } of columns) {
    const { rows } = await demo.asSuperuser.query<{ at: string | null }>(
      `select ((${column} at time zone 'America/New_York') - make_interval(days => $2))::text as at
       from ${table} where clinic_id = $1 order by 1`,
      [demoClinicId, daysBack],
    );
    found[`${table}.${column}`] = rows.map(({ at }) => at);
  }
  return found;
};

const query = async <Row extends object>(text: string): Promise<Row[]> =>
  (await demo.asSuperuser.query<Row>(text)).rows;

const checkInAsInes = (at: Date) =>
  asPerson(demo, personIdOf('Ines Valcourt'), (tx, actor) =>
    submitCheckIn(
      tx,
      actor,
      {
        id: randomUUID(),
        kind: 'daily',
        answers: {
          painNow: 3,
          painWorst: 4,
          swelling: 'same',
          sling: ['as-advised'],
          dangerNone: true,
          symptomsNone: true,
        },
        answeredAt: at.toISOString(),
        sentAt: at.toISOString(),
        rulesVersion,
      },
      at,
    ),
  );

test('a demo of Friday is of today on Tuesday: all dates four days on, all times as they were, over the clock change', async () => {
  await checkInAsInes(fridayAfternoon);
  const before = await localTimes(0);
  expect(Object.keys(before).length).toBeGreaterThan(20);
  await demo.act('re-anchor', tuesday);
  expect(await localTimes(4)).toEqual(before);
  const [newest] = await query(`select max(local_date)::text as date from check_ins`);
  expect(newest).toEqual({ date: '2026-11-03' });
});

test('what users have added moves too and stays what it was', async () => {
  await checkInAsInes(fridayAfternoon);
  const [open] = await query<{ id: string }>(
    `select id from flags where state = 'open' and patient_id = '${patientIdOf('Rukmini Dass')}'`,
  );
  await asPerson(demo, staffId('noor'), (tx, actor) =>
    close(
      tx,
      actor,
      { flagId: open!.id, outcome: 'no-action-needed', worthRaising: 'no', note: 'Overdid it.' },
      fridayAfternoon,
    ),
  );
  const [thread] = await query<{ id: string }>(`select id from threads where subject = 'Ball or table?'`);
  await asPerson(demo, staffId('noor'), (tx, actor) =>
    addMessage(
      tx,
      actor,
      { threadId: thread!.id, id: randomUUID(), text: 'A pillowcase is fine.' },
      fridayAfternoon,
    ),
  );
  await demo.act('re-anchor', tuesday);
  // 17:30 by winter time, an hour of universal time later than by summer time.
  const moved = new Date('2026-11-03T22:30:00Z');
  expect(
    await query(`select received_at, local_date::text from check_ins
      where author_id = '${personIdOf('Ines Valcourt')}' order by received_at desc limit 1`),
  ).toEqual([{ received_at: moved, local_date: '2026-11-03' }]);
  expect(await query(`select closed_at, outcome, outcome_note from flags where id = '${open!.id}'`)).toEqual([
    { closed_at: moved, outcome: 'no-action-needed', outcome_note: 'Overdid it.' },
  ]);
  expect(
    await query(
      `select sent_at from messages where thread_id = '${thread!.id}' order by sequence desc limit 1`,
    ),
  ).toEqual([{ sent_at: moved }]);
});

test('birth dates stay', async () => {
  const birthDates = 'select id, birth_date::text from patients order by id';
  const before = await query(birthDates);
  await demo.act('re-anchor', tuesday);
  expect(await query(birthDates)).toEqual(before);
});

test('a demo of today, and one moved already, is left as it is', async () => {
  const before = await rowsOf(demo, demoClinicId);
  await demo.act('re-anchor', fridayAfternoon);
  expect(await rowsOf(demo, demoClinicId)).toEqual(before);
  await demo.act('re-anchor', tuesday);
  const moved = await rowsOf(demo, demoClinicId);
  await demo.act('re-anchor', tuesday);
  expect(await rowsOf(demo, demoClinicId)).toEqual(moved);
});

test('moved early on a day, nothing lies in the future and everything is in its order', async () => {
  await checkInAsInes(fridayAfternoon);
  const order = 'select id from check_ins order by answered_at, id';
  const before = await query(order);
  // 07:30 in the clinic.
  const early = new Date('2026-11-02T12:30:00Z');
  await demo.act('re-anchor', early);
  const times = Object.entries(await localTimes(0));
  const later = times.flatMap(([column, at]) =>
    at.filter((one) => one! > '2026-11-02 07:30:00').map((one) => [column, one]),
  );
  expect(later).toEqual([]);
  expect(await query(order)).toEqual(before);
  // What had happened by 07:30 on Friday stands at the same time on Monday.
  const breakfast = `select count(*)::int as n from check_ins
    where to_char(answered_at at time zone 'America/New_York', 'YYYY-MM-DD HH24:MI') = '2026-11-02 06:50'`;
  expect(await query(breakfast)).toEqual([{ n: 1 }]);
});

test('words that name a day move with it', async () => {
  const [before] = await query<{ subject: string }>(
    `select subject from threads t join flags f on f.id = t.flag_id where f.state = 'claimed'`,
  );
  expect(before!.subject).toBe('Your check-in on October 30');
  await demo.act('re-anchor', tuesday);
  const [after] = await query<{ subject: string }>(
    `select subject from threads t join flags f on f.id = t.flag_id where f.state = 'claimed'`,
  );
  expect(after!.subject).toBe('Your check-in on November 3');
  const notes = await query<{ text: string }>(
    `select text from messages where kind = 'note' and sent_at > '2026-11-03T05:00:00Z'`,
  );
  expect(notes.length).toBeGreaterThan(0);
  for (const { text } of notes) expect(text).toMatch(/opens Tuesday 08:00/);
});

test('another clinic is not touched, also where the owner could pass row security', async () => {
  const other = await plantWholeClinic(demo);
  const before = await rowsOf(demo, other.clinicId);
  await demo.act('re-anchor', tuesday);
  expect(await rowsOf(demo, other.clinicId)).toEqual(before);
  await demo.actAsSuperuser('re-anchor', new Date('2026-11-05T23:00:00Z'));
  expect(await rowsOf(demo, other.clinicId)).toEqual(before);
  const [newest] = await query(
    `select max(local_date)::text as date from check_ins where clinic_id = '${demoClinicId}'`,
  );
  expect(newest).toEqual({ date: '2026-11-05' });
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
