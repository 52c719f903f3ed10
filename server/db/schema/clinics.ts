import { boolean, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import type { OpeningHours } from '#shared/clinic/hours.ts';

export const clinics = pgTable('clinics', {
  id: uuid().primaryKey().defaultRandom(),
  name: text().notNull(),
  timeZone: text().notNull(),
  emergencyNumber: text().notNull(),
  crisisNumber: text().notNull(),
  onCallNumber: text().notNull(),
  phone: text().notNull(),
  /** ISO 3166: how a telephone number without a country code is read. */
  country: text().notNull().default('US'),
  openingHours: jsonb().$type<OpeningHours>().notNull(),
  /** The demo clinic may be emptied and filled again; no other ever is. */
  isDemo: boolean().notNull().default(false),
});
