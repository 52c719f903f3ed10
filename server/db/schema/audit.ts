import { foreignKey, index, jsonb, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { people } from './people.ts';

/** Who did or saw what. The application's role may only insert here. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    ...clinicRow(),
    at: instant().notNull(),
    actorKind: text({ enum: ['person', 'link', 'system', 'anonymous'] }).notNull(),
    personId: uuid(),
    action: text().notNull(),
    /** The row it was about, and whose record that is. Without keys: an entry outlives what it names. */
    subjectId: uuid(),
    patientId: uuid(),
    detail: jsonb().$type<Record<string, string | number | boolean | null>>(),
    /** Set for openings of charts and lists: repeats within five minutes join into one entry. */
    joinKey: text(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.patientId, table.at),
    uniqueIndex('audit_entries_join').on(table.clinicId, table.joinKey),
  ],
);
