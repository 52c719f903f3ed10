import { createHmac } from 'node:crypto';
import connectPgSimple from 'connect-pg-simple';
import { and, desc, eq, gt, isNull, ne, or, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { RequestHandler } from 'express';
import session from 'express-session';
import type pg from 'pg';
import type { Logger } from 'pino';
import { signedInSessions } from '../db/schema/gate.ts';

const minuteMs = 60_000;
const hourMs = 60 * minuteMs;

/** Idle and longest life of a session, by who holds it (safety numbers). */
const lives = {
  staff: { idleAfterMs: 15 * minuteMs, endsAfterMs: 12 * hourMs },
  patient: { idleAfterMs: 30 * minuteMs, endsAfterMs: 24 * hourMs },
  patientStaying: { idleAfterMs: null, endsAfterMs: 30 * 24 * hourMs },
} as const;

/** A live session: its own row, read anew on every request. */
export type SignedIn = {
  sessionId: string;
  clinicId: string;
  personId: string;
  idleAfterMs: number | null;
  lastActivityAt: Date;
  endsAt: Date;
  /** When the person last proved who they are. */
  provenAt: Date;
  secondFactor: SecondFactor | null;
};

export type SecondFactor = 'passkey' | 'authenticator' | 'recovery-code';

export type SessionKeys = { gate: pg.Pool; secret: string };

const gateDb = (gate: pg.Pool) => drizzle({ client: gate, casing: 'snake_case' });

const signedInColumns = {
  sessionId: signedInSessions.id,
  clinicId: signedInSessions.clinicId,
  personId: signedInSessions.personId,
  idleAfterMs: signedInSessions.idleAfterMs,
  lastActivityAt: signedInSessions.lastActivityAt,
  endsAt: signedInSessions.endsAt,
  provenAt: signedInSessions.provenAt,
  secondFactor: signedInSessions.secondFactor,
};

const isAlive = (now: Date) =>
  and(
    isNull(signedInSessions.revokedAt),
    gt(signedInSessions.endsAt, now),
    or(
      isNull(signedInSessions.idleAfterMs),
      gt(
        sql`${signedInSessions.lastActivityAt} + ${signedInSessions.idleAfterMs} * interval '1 millisecond'`,
        now,
      ),
    ),
  );

/** The session of that id, unless it was revoked, ended, or has been idle for too long. */
export const liveSession = async (gate: pg.Pool, sessionId: string, now: Date): Promise<SignedIn | null> => {
  const rows = await gateDb(gate)
    .select(signedInColumns)
    .from(signedInSessions)
    .where(and(eq(signedInSessions.id, sessionId), isAlive(now)));
  return rows[0] ?? null;
};

/** Somebody's live sessions with what their owner knows them by, newest activity first. */
export const liveSessionsOf = (gate: pg.Pool, personId: string, now: Date) =>
  gateDb(gate)
    .select({
      ...signedInColumns,
      startedAt: signedInSessions.startedAt,
      userAgent: signedInSessions.userAgent,
    })
    .from(signedInSessions)
    .where(and(eq(signedInSessions.personId, personId), isAlive(now)))
    .orderBy(desc(signedInSessions.lastActivityAt), desc(signedInSessions.startedAt), signedInSessions.id);

export const startSession = async (
  gate: pg.Pool,
  person: {
    clinicId: string;
    personId: string;
    isStaff: boolean;
    staySignedIn: boolean;
    secondFactor: SecondFactor | null;
    userAgent: string | null;
  },
  now: Date,
): Promise<SignedIn> => {
  const life = person.isStaff ? lives.staff : person.staySignedIn ? lives.patientStaying : lives.patient;
  const rows = await gateDb(gate)
    .insert(signedInSessions)
    .values({
      clinicId: person.clinicId,
      personId: person.personId,
      startedAt: now,
      lastActivityAt: now,
      idleAfterMs: life.idleAfterMs,
      endsAt: new Date(now.getTime() + life.endsAfterMs),
      userAgent: person.userAgent,
      provenAt: now,
      secondFactor: person.secondFactor,
    })
    .returning(signedInColumns);
  const started = rows[0];
  if (!started) throw new Error('The session row was not written.');
  return started;
};

export const revokeSession = async (gate: pg.Pool, sessionId: string, now: Date): Promise<void> => {
  await gateDb(gate)
    .update(signedInSessions)
    .set({ revokedAt: now })
    .where(and(eq(signedInSessions.id, sessionId), isNull(signedInSessions.revokedAt)));
};

/** Ends a live session of that person; false where there is none of that id. */
export const revokeSessionOf = async (
  gate: pg.Pool,
  { personId, sessionId }: { personId: string; sessionId: string },
  now: Date,
): Promise<boolean> => {
  const rows = await gateDb(gate)
    .update(signedInSessions)
    .set({ revokedAt: now })
    .where(and(eq(signedInSessions.id, sessionId), eq(signedInSessions.personId, personId), isAlive(now)))
    .returning({ id: signedInSessions.id });
  return rows.length > 0;
};

/** Ends every live session of a person but the one that is kept; returns the ids of those that ended. */
export const revokeSessionsOf = async (
  gate: pg.Pool,
  personId: string,
  now: Date,
  keep: string | null = null,
): Promise<string[]> => {
  const rows = await gateDb(gate)
    .update(signedInSessions)
    .set({ revokedAt: now })
    .where(
      and(
        eq(signedInSessions.personId, personId),
        isNull(signedInSessions.revokedAt),
        keep === null ? undefined : ne(signedInSessions.id, keep),
      ),
    )
    .returning({ id: signedInSessions.id });
  return rows.map(({ id }) => id);
};

/** The person has proved anew who they are, and perhaps given a second factor; null where the session ended. */
export const proveSession = async (
  gate: pg.Pool,
  sessionId: string,
  secondFactor: SecondFactor | null,
  now: Date,
): Promise<SignedIn | null> => {
  const rows = await gateDb(gate)
    .update(signedInSessions)
    .set({ provenAt: now, ...(secondFactor === null ? {} : { secondFactor }) })
    .where(and(eq(signedInSessions.id, sessionId), isAlive(now)))
    .returning(signedInColumns);
  return rows[0] ?? null;
};

/** Starts the idle clock anew; null where the session is no longer alive. */
export const touchSession = async (gate: pg.Pool, sessionId: string, now: Date): Promise<SignedIn | null> => {
  const rows = await gateDb(gate)
    .update(signedInSessions)
    .set({ lastActivityAt: now })
    .where(and(eq(signedInSessions.id, sessionId), isAlive(now)))
    .returning(signedInColumns);
  return rows[0] ?? null;
};

/** The token that every write carries in a header: bound to the session, useless with another. */
export const writeTokenFor = (secret: string, sessionId: string): string =>
  createHmac('sha256', secret).update(`write:${sessionId}`).digest('base64url');

/** When a session ends by itself, as the client is told. */
export const timesOf = ({ idleAfterMs, lastActivityAt, endsAt }: SignedIn) => ({
  idleEndsAt: idleAfterMs === null ? null : new Date(lastActivityAt.getTime() + idleAfterMs).toISOString(),
  endsAt: endsAt.toISOString(),
});

/** Express-session over the gate pool. The cookie lasts as long as the browser, or as a stay of 30 days. */
export const sessionMiddleware = (
  { gate, secret }: SessionKeys,
  { secureCookie, log }: { secureCookie: boolean; log: Logger },
): RequestHandler => {
  const Store = connectPgSimple(session);
  return session({
    store: new Store({
      pool: gate,
      tableName: 'browser_sessions',
      disableTouch: true,
      ttl: lives.patient.endsAfterMs / 1000,
      errorLog: (...detail: unknown[]) =>
        log.error({ detail: String(detail[0]) }, 'the session store failed'),
    }),
    name: secureCookie ? '__Host-espalier' : 'espalier',
    secret,
    resave: false,
    saveUninitialized: false,
    rolling: false,
    cookie: { httpOnly: true, sameSite: 'lax', secure: secureCookie, path: '/' },
  });
};
