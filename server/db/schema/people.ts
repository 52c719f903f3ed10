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
    /** E.164, as in +15185550123; what pages ring. Null where none is known. */
    phone: text(),
    /** Where this person's quiet hours and reminders are counted; null for the clinic's own. */
    timeZone: text(),
    /** Quiet hours as 21:00 and 07:00 in that zone; both null for none. Pages pass them. */
    quietFrom: text(),
    quietUntil: text(),
    /** When a patient wants to be reminded of the check-in, as 10:00. */
    remindAt: text(),
    active: boolean().notNull().default(true),
    deactivatedAt: instant(),
    /** Null until the first sign-in: invited, and not come yet. */
    firstSignedInAt: instant(),
    /** Mail to this address came back; null again once the address is changed or a mail arrives. */
    emailBouncedAt: instant(),
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
