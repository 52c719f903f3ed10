import { eq, inArray, sql } from 'drizzle-orm';
import type pg from 'pg';
import { clinics } from '../db/schema/clinics.ts';
import {
  authenticators,
  browserSessions,
  credentials,
  oneTimeTokens,
  passkeys,
  pendingSignIns,
  recoveryCodes,
  signedInSessions,
} from '../db/schema/gate.ts';
import { withTx, type Tx } from '../db/with-tx.ts';
import { moveToToday } from './anchor.ts';
import { demoClinicId } from './clinic.ts';
import { fillDemo, type DemoKeys } from './fill.ts';
import { clinicTables } from './tables.ts';

/** Any number that nothing else locks; two acts at once wait for each other. */
const demoLock = 4_600_002;

/** Whether it is there. Its row stays locked, so that writes of a running product wait and find it gone or whole. */
const isThere = async (tx: Tx): Promise<boolean> => {
  const rows = await tx
    .select({ isDemo: clinics.isDemo })
    .from(clinics)
    .where(eq(clinics.id, demoClinicId))
    .for('update');
  const clinic = rows[0];
  if (clinic && !clinic.isDemo) throw new Error('The clinic with the id of the demo clinic is not a demo.');
  return clinic !== undefined;
};

/** The gate's tables that hold ways in, by clinic. */
const waysIn = [credentials, passkeys, authenticators, recoveryCodes, pendingSignIns, oneTimeTokens] as const;

/** Takes the demo clinic away, children first, with its ways in and its people's sessions. */
const empty = async (tx: Tx): Promise<void> => {
  const sessions = tx
    .select({ id: sql<string>`${signedInSessions.id}::text` })
    .from(signedInSessions)
    .where(eq(signedInSessions.clinicId, demoClinicId));
  await tx
    .delete(browserSessions)
    .where(inArray(sql`${browserSessions.sess} -> 'passport' ->> 'user'`, sessions));
  await tx.delete(signedInSessions).where(eq(signedInSessions.clinicId, demoClinicId));
  for (const table of waysIn) await tx.delete(table).where(eq(table.clinicId, demoClinicId));
  for (const table of [...clinicTables].reverse()) {
    await tx.delete(table).where(eq(table.clinicId, demoClinicId));
  }
  await tx.delete(clinics).where(eq(clinics.id, demoClinicId));
};

/**
 * What can be done to the demo clinic, each in one transaction of the database's owner: done or not done. Row
 * security holds the owner to this clinic, and every statement names it besides.
 */
const demoActs = {
  /** Fills it where it is not there yet. */
  fill: async (tx: Tx, now: Date, keys: DemoKeys): Promise<void> => {
    if (!(await isThere(tx))) await fillDemo(tx, now, keys);
  },
  /** Moves it to today where it is of an earlier day. */
  're-anchor': async (tx: Tx, now: Date): Promise<void> => {
    if (await isThere(tx)) await moveToToday(tx, now);
  },
  /** Takes it away where it is there: where the demo is off, its published passwords open nothing. */
  remove: async (tx: Tx): Promise<void> => {
    if (await isThere(tx)) await empty(tx);
  },
  /** Empties it and fills it again. */
  reset: async (tx: Tx, now: Date, keys: DemoKeys): Promise<void> => {
    if (await isThere(tx)) await empty(tx);
    await fillDemo(tx, now, keys);
  },
};

export type DemoAct = keyof typeof demoActs;

export const runDemoAct = (owner: pg.Pool, act: DemoAct, now: Date, keys: DemoKeys): Promise<void> =>
  withTx(owner, { kind: 'system', clinicId: demoClinicId }, async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${demoLock})`);
    await demoActs[act](tx, now, keys);
  });
