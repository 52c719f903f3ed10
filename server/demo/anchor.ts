import { and, eq, getTableColumns, isNotNull, like, max, or, sql, type SQL } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';
import { daysBetween, localDateIn } from '#shared/plans/calendar.ts';
import { alerts, checkIns } from '../db/schema/check-ins.ts';
import { flags } from '../db/schema/flags.ts';
import { oneTimeTokens } from '../db/schema/gate.ts';
import { invitations } from '../db/schema/invitations.ts';
import { notifications } from '../db/schema/notifications.ts';
import { patients } from '../db/schema/patients.ts';
import { messages, threads } from '../db/schema/threads.ts';
import type { Tx } from '../db/with-tx.ts';
import { clinicOf } from '../features/clinic/queries.ts';
import { demoClinicId, demoTimeZone } from './clinic.ts';
import { flagSubject } from './flag-threads.ts';
import { instantAt } from './moments.ts';
import { clinicTables, type ClinicTable } from './tables.ts';
import { closedClinicNote, closedClinicWords } from './threads.ts';

/** A birth date is the person's own; every other date and instant of the demo moves. */
const staying: readonly PgColumn[] = [patients.birthDate];

/** Written by the clocks of people's devices, which may be wrong by years: no measure of what is newest. */
const ofDeviceClocks: readonly PgColumn[] = [checkIns.answeredAt, alerts.answeredAt];

/** These lie ahead by what they are, and are not drawn to now. */
const ahead: readonly PgColumn[] = [invitations.expiresAt, notifications.dueAt];

type MovingColumn = { key: string; column: PgColumn; kind: 'instant' | 'date' };

/** The dates and instants of a table, by the names that Drizzle knows them by. */
const movingColumns = (table: ClinicTable): MovingColumn[] =>
  Object.entries(getTableColumns(table)).flatMap(([key, column]): MovingColumn[] => {
    if (staying.includes(column)) return [];
    if (column.getSQLType() === 'timestamp with time zone') return [{ key, column, kind: 'instant' }];
    return column.getSQLType() === 'date' ? [{ key, column, kind: 'date' }] : [];
  });

const ofDemo = (table: ClinicTable): SQL => eq(table.clinicId, demoClinicId);

const update = async (tx: Tx, table: ClinicTable, values: Record<string, SQL>, where: SQL | undefined) => {
  if (Object.keys(values).length > 0) await tx.update(table).set(values).where(where);
};

/** Whole days later at the same local time, so that a clock change in between makes no breakfast earlier. */
const daysLater = ({ column, kind }: MovingColumn, days: number): SQL =>
  kind === 'date'
    ? sql`${column} + ${days}::int`
    : sql`((${column} at time zone ${demoTimeZone}::text) + make_interval(days => ${days}::int)) at time zone ${demoTimeZone}::text`;

/** The newest instant up to now and the newest of all, by the clock of the server. */
const newestInstants = async (tx: Tx, now: Date) => {
  const newest = clinicTables.flatMap((table) =>
    movingColumns(table)
      .filter(
        ({ kind, column }) =>
          kind === 'instant' && !ofDeviceClocks.includes(column) && !ahead.includes(column),
      )
      .map(
        ({
          column,
        }) => sql`select max(${column}) filter (where ${column} <= ${now.toISOString()}::timestamptz) as past,
          max(${column}) as ever from ${table} where ${ofDemo(table)}`,
      ),
  );
  const { rows } = await tx.execute<{ past: number | null; ever: number | null }>(
    sql`select extract(epoch from max(past))::float8 * 1000 as past, extract(epoch from max(ever))::float8 * 1000 as ever
      from (${sql.join(newest, sql` union all `)}) newest`,
  );
  const { past = null, ever = null } = rows[0] ?? {};
  return { pastMs: past, everMs: ever };
};

/**
 * Draws what would lie after now together between the last thing before it and now, in the same order. A demo
 * can be filled or moved at any hour, and its morning has then happened by now, if earlier than usual.
 */
export const keepOutOfTheFuture = async (tx: Tx, now: Date): Promise<void> => {
  const { pastMs, everMs } = await newestInstants(tx, now);
  if (everMs === null || everMs <= now.getTime()) return;
  const from = new Date(Math.max(pastMs ?? 0, instantAt(localDateIn(demoTimeZone, now), 0).getTime()));
  const share = (now.getTime() - from.getTime()) / (everMs - from.getTime());
  const at = (instant: Date) => sql`${instant.toISOString()}::timestamptz`;
  for (const table of clinicTables) {
    const columns = movingColumns(table).filter(
      ({ kind, column }) => kind === 'instant' && !ahead.includes(column),
    );
    if (columns.length === 0) continue;
    const isLater = ({ column }: MovingColumn): SQL => sql`${column} > ${at(now)}`;
    const values = columns.map((one): [string, SQL] => [
      one.key,
      sql`case when ${isLater(one)} then date_trunc('milliseconds',
        least(${at(now)}, ${at(from)} + (${one.column} - ${at(from)}) * ${share}::float8)) else ${one.column} end`,
    ]);
    await update(tx, table, Object.fromEntries(values), and(ofDemo(table), or(...columns.map(isLater))));
  }
};

/** Words that name a day move with it: the subjects of threads about flags, and when the clinic opens. */
const rewordDays = async (tx: Tx): Promise<void> => {
  const aboutFlags = await tx
    .select({ id: threads.id, raisedAt: flags.raisedAt })
    .from(threads)
    .innerJoin(flags, and(eq(flags.clinicId, threads.clinicId), eq(flags.id, threads.flagId)))
    .where(and(ofDemo(threads), isNotNull(threads.flagId)));
  for (const { id, raisedAt } of aboutFlags) {
    await tx
      .update(threads)
      .set({ subject: flagSubject(raisedAt) })
      .where(and(ofDemo(threads), eq(threads.id, id)));
  }
  const clinic = await clinicOf(tx, demoClinicId);
  const notes = await tx
    .select({ id: messages.id, sentAt: messages.sentAt })
    .from(messages)
    .where(and(ofDemo(messages), eq(messages.kind, 'note'), like(messages.text, `${closedClinicWords}%`)));
  for (const { id, sentAt } of notes) {
    await tx
      .update(messages)
      .set({ text: closedClinicNote(clinic, sentAt) })
      .where(and(ofDemo(messages), eq(messages.id, id)));
  }
};

/**
 * Moves a demo whose newest check-in is of an earlier day to today, by whole days and with everything that its
 * users have added. Returns the days moved.
 */
export const moveToToday = async (tx: Tx, now: Date): Promise<number> => {
  const rows = await tx
    .select({ newest: max(checkIns.localDate) })
    .from(checkIns)
    .where(ofDemo(checkIns));
  const newest = rows[0]?.newest;
  const days = newest ? daysBetween(newest, localDateIn(demoTimeZone, now)) : 0;
  if (days <= 0) return 0;
  for (const table of [...clinicTables, oneTimeTokens]) {
    const values = movingColumns(table).map((one): [string, SQL] => [one.key, daysLater(one, days)]);
    await update(tx, table, Object.fromEntries(values), ofDemo(table));
  }
  await keepOutOfTheFuture(tx, now);
  await rewordDays(tx);
  return days;
};
