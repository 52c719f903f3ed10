import { primaryKey, timestamp, uuid, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { clinics } from './clinics.ts';

/** The two columns that every table inside a clinic's fence begins with; together they are its key. */
export const clinicRow = () => ({
  clinicId: uuid()
    .notNull()
    .references(() => clinics.id),
  id: uuid().notNull().defaultRandom(),
});

export const clinicKey = (table: { clinicId: AnyPgColumn; id: AnyPgColumn }) =>
  primaryKey({ columns: [table.clinicId, table.id] });

/** An instant. Sessions of the database run in UTC. */
export const instant = () => timestamp({ withTimezone: true, mode: 'date' });
