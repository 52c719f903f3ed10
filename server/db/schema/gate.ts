import { index, integer, json, pgTable, text, uuid, varchar } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/**
 * Tables outside the clinics' fence, reached by the gate pool alone. They are read before anyone knows
 * which clinic a request belongs to, so row security has nothing to compare with; in exchange the gate's
 * role has rights to these tables and to no other.
 */

/** The ways in. They hold ids of people and nothing of a patient's record. */
export const credentials = pgTable('credentials', {
  personId: uuid().primaryKey(),
  clinicId: uuid().notNull(),
  /** Lower case, NFC. */
  email: text().notNull().unique(),
  passwordHash: text().notNull(),
});

/** The store of express-session: which browser holds which session. */
export const browserSessions = pgTable(
  'browser_sessions',
  { sid: varchar().primaryKey(), sess: json().notNull(), expire: instant().notNull() },
  (table) => [index().on(table.expire)],
);

/** Decides on every request whether a session is alive; the store above can bring a deleted row back. */
export const signedInSessions = pgTable(
  'signed_in_sessions',
  {
    id: uuid().primaryKey().defaultRandom(),
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    startedAt: instant().notNull(),
    lastActivityAt: instant().notNull(),
    /** Null where the person chose to stay signed in. */
    idleAfterMs: integer(),
    endsAt: instant().notNull(),
    revokedAt: instant(),
    userAgent: text(),
  },
  (table) => [index().on(table.personId)],
);

/** Failures to sign in, by a hash of the e-mail tried, known or not. */
export const signInAttempts = pgTable('sign_in_attempts', {
  emailHash: text().primaryKey(),
  failures: integer().notNull(),
  blockedUntil: instant().notNull(),
  lastAt: instant().notNull(),
});

/** Every worker's last sign of life. */
export const workerHeartbeats = pgTable('worker_heartbeats', {
  workerId: uuid().primaryKey(),
  beatAt: instant().notNull(),
});
