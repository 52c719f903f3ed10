import { sql } from 'drizzle-orm';
import { foreignKey, index, integer, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { people } from './people.ts';

export const notificationKinds = ['new-flag', 'new-emergency', 'new-message'] as const;

/** One row per person, channel and occasion: written pending, sent outside the transaction, then marked. */
export const notifications = pgTable(
  'notifications',
  {
    ...clinicRow(),
    personId: uuid().notNull(),
    channel: text({ enum: ['email'] }).notNull(),
    kind: text({ enum: notificationKinds }).notNull(),
    /** What it is about, as ids and numbers only; the same occasion notifies a person once per channel. */
    occasion: text().notNull(),
    /** Where the link leads, relative to the public address. */
    path: text().notNull(),
    state: text({ enum: ['pending', 'sent', 'failed'] })
      .notNull()
      .default('pending'),
    attempts: integer().notNull().default(0),
    lastError: text(),
    createdAt: instant().notNull(),
    sentAt: instant(),
  },
  (table) => [
    clinicKey(table),
    unique('notifications_once').on(table.clinicId, table.personId, table.channel, table.occasion),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index('notifications_waiting')
      .on(table.createdAt)
      .where(sql`state = 'pending'`),
  ],
);
