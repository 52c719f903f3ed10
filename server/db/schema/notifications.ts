import { sql } from 'drizzle-orm';
import {
  boolean,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { notificationChannels, notificationKinds, notificationStates } from '#shared/notifications/kinds.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { people } from './people.ts';

/**
 * One row per person, channel, device and occasion: written pending, sent outside the transaction, then marked.
 * A row is never deleted, so what was sent, what failed and what came back can be shown.
 */
export const notifications = pgTable(
  'notifications',
  {
    ...clinicRow(),
    personId: uuid().notNull(),
    channel: text({ enum: notificationChannels }).notNull(),
    kind: text({ enum: notificationKinds }).notNull(),
    /** What it is about, as ids and numbers only; the same occasion notifies a person once per channel. */
    occasion: text().notNull(),
    /** Where the link leads, relative to the public address. Ids only, never a secret. */
    path: text().notNull(),
    /** For push: the id of the subscription. Empty for the other channels. */
    target: text().notNull().default(''),
    state: text({ enum: notificationStates }).notNull().default('pending'),
    attempts: integer().notNull().default(0),
    lastError: text(),
    createdAt: instant().notNull(),
    /** When the next try is due: the end of quiet hours, or of the pause after a failure. */
    dueAt: instant().notNull().defaultNow(),
    /** Until when one worker is trying; after that another may. */
    leasedUntil: instant(),
    sentAt: instant(),
    /** The gateway's own name for it. */
    providerId: text(),
    /** What came of a call or a mail afterwards: answered, no answer, came back. */
    outcome: text(),
    acknowledgedAt: instant(),
  },
  (table) => [
    clinicKey(table),
    unique('notifications_once').on(
      table.clinicId,
      table.personId,
      table.channel,
      table.occasion,
      table.target,
    ),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index('notifications_waiting')
      .on(table.createdAt)
      .where(sql`state = 'pending'`),
    index('notifications_due')
      .on(table.dueAt)
      .where(sql`state = 'pending'`),
    index('notifications_provider').on(table.clinicId, table.providerId),
  ],
);

/** Where a person wants a kind on a channel otherwise than by default. */
export const notificationSettings = pgTable(
  'notification_settings',
  {
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    kind: text({ enum: notificationKinds }).notNull(),
    channel: text({ enum: notificationChannels }).notNull(),
    enabled: boolean().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.clinicId, table.personId, table.kind, table.channel] }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
  ],
);

/** A browser that a person lets be woken. It belongs to the session that made it and ends with a sign-out. */
export const pushSubscriptions = pgTable(
  'push_subscriptions',
  {
    ...clinicRow(),
    personId: uuid().notNull(),
    sessionId: uuid().notNull(),
    endpoint: text().notNull(),
    /** The keys of RFC 8291, base64url: the browser's public key, and its authentication secret. */
    p256dh: text().notNull(),
    auth: text().notNull(),
    deviceName: text().notNull(),
    createdAt: instant().notNull(),
    lastSentAt: instant(),
  },
  (table) => [
    clinicKey(table),
    unique('push_subscriptions_endpoint').on(table.clinicId, table.endpoint),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.personId),
    index().on(table.clinicId, table.sessionId),
  ],
);
