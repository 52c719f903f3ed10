import {
  bigint,
  boolean,
  index,
  integer,
  json,
  pgTable,
  text,
  uniqueIndex,
  uuid,
  varchar,
} from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
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
  /** Null where the person has passkeys alone. */
  passwordHash: text(),
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
    /** When the person last proved who they are; sensitive acts ask for a proof of the last five minutes. */
    provenAt: instant()
      .notNull()
      .default(sql`to_timestamp(0)`),
    /** How the second factor was given; null where there was none, which opens nothing to staff. */
    secondFactor: text({ enum: ['passkey', 'authenticator', 'recovery-code'] }),
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

/** WebAuthn credentials. A public key says nothing of a record, and is needed before anybody is known. */
export const passkeys = pgTable(
  'passkeys',
  {
    id: uuid().primaryKey().defaultRandom(),
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    /** The authenticator's own id for it, base64url. */
    credentialId: text().notNull().unique(),
    /** COSE, base64url. */
    publicKey: text().notNull(),
    counter: bigint({ mode: 'number' }).notNull(),
    transports: text().array().notNull(),
    backedUp: boolean().notNull(),
    name: text().notNull(),
    createdAt: instant().notNull(),
    lastUsedAt: instant(),
  },
  (table) => [index().on(table.personId)],
);

/** A challenge is answered once, within minutes, for the purpose and the person it was made for. */
export const passkeyChallenges = pgTable('passkey_challenges', {
  id: uuid().primaryKey().defaultRandom(),
  challenge: text().notNull(),
  purpose: text({ enum: ['register', 'sign-in', 'second-factor', 'prove'] }).notNull(),
  personId: uuid(),
  expiresAt: instant().notNull(),
});

/** The shared secret of an authenticator app (RFC 6238), sealed; and the last time step that was accepted. */
export const authenticators = pgTable('authenticators', {
  personId: uuid().primaryKey(),
  clinicId: uuid().notNull(),
  sealedSecret: text().notNull(),
  /** Null until a first code has shown that the app holds the secret. */
  confirmedAt: instant(),
  /** A code counts once (RFC 6238, section 5.2). */
  lastStep: integer(),
  /** Of a new app that is to take the place of a confirmed one, until its first code; sealed likewise. */
  nextSealedSecret: text(),
});

/** Each opens the second step once. */
export const recoveryCodes = pgTable(
  'recovery_codes',
  {
    id: uuid().primaryKey().defaultRandom(),
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    codeHash: text().notNull(),
    usedAt: instant(),
  },
  (table) => [index().on(table.personId)],
);

/** A password was right and the second factor is still to come. */
export const pendingSignIns = pgTable('pending_sign_ins', {
  id: uuid().primaryKey().defaultRandom(),
  clinicId: uuid().notNull(),
  personId: uuid().notNull(),
  tries: integer().notNull().default(0),
  expiresAt: instant().notNull(),
});

/**
 * What somebody may do once without being signed in: accept an invitation, choose a new password, confirm an
 * address. The secret itself is made from the id and a key of the server and is kept nowhere.
 */
export const oneTimeTokens = pgTable(
  'one_time_tokens',
  {
    id: uuid().primaryKey().defaultRandom(),
    clinicId: uuid().notNull(),
    personId: uuid().notNull(),
    kind: text({ enum: ['invitation', 'password-reset', 'email-change'] }).notNull(),
    /** Keyed hash of the short code of a letter. */
    codeHash: text(),
    /** For an e-mail change: the address to be confirmed. */
    email: text(),
    createdAt: instant().notNull(),
    expiresAt: instant().notNull(),
    usedAt: instant(),
    revokedAt: instant(),
  },
  (table) => [
    index().on(table.personId),
    uniqueIndex('one_time_tokens_code')
      .on(table.codeHash)
      .where(sql`code_hash is not null`),
  ],
);
