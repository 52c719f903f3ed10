import { boolean, foreignKey, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { roles } from '#shared/access/permissions.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';

/** Everybody who can sign in, patients among them. The way in itself lies outside the fence (credentials). */
export const people = pgTable(
  'people',
  {
    ...clinicRow(),
    name: text().notNull(),
    /** The professional title shown behind a clinician's name, as in "PT". */
    credential: text(),
    email: text().notNull(),
    active: boolean().notNull().default(true),
    createdAt: instant().notNull(),
  },
  (table) => [clinicKey(table)],
);

export const personRoles = pgTable(
  'person_roles',
  {
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    role: text({ enum: roles }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.clinicId, table.personId, table.role] }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
  ],
);
