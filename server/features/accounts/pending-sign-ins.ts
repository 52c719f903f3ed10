import { and, eq, gt, lt, lte, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { Problem } from '#shared/problems/problems.ts';
import { pendingSignIns } from '../../db/schema/gate.ts';
import type { Gate } from './one-time-tokens.ts';

type Someone = { clinicId: string; personId: string };

const holdsMs = 5 * 60_000;
const triesInAll = 5;

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

const isOpen = (id: string, now: Date) =>
  and(eq(pendingSignIns.id, id), lt(pendingSignIns.tries, triesInAll), gt(pendingSignIns.expiresAt, now));

const whose = { clinicId: pendingSignIns.clinicId, personId: pendingSignIns.personId };

const isOver = (): Problem =>
  new Problem('link-spent', 'This sign-in took too long, or had too many tries. Please begin again.');

/** The password was right; its id names the rest of the sign-in to this browser alone. */
export const beginPendingSignIn = async (
  gate: Gate,
  { clinicId, personId }: Someone,
  now: Date,
): Promise<string> => {
  await gateDb(gate).delete(pendingSignIns).where(lte(pendingSignIns.expiresAt, now));
  const rows = await gateDb(gate)
    .insert(pendingSignIns)
    .values({ clinicId, personId, expiresAt: new Date(now.getTime() + holdsMs) })
    .returning({ id: pendingSignIns.id });
  const begun = rows[0];
  if (!begun) throw new Error('The half-done sign-in was not written.');
  return begun.id;
};

export const pendingSignIn = async (gate: Gate, id: string, now: Date): Promise<Someone> => {
  const rows = await gateDb(gate).select(whose).from(pendingSignIns).where(isOpen(id, now));
  if (!rows[0]) throw isOver();
  return rows[0];
};

/** Counts a try, in one statement and before anything is looked at, and says whose sign-in it is. */
export const countPendingTry = async (gate: Gate, id: string, now: Date): Promise<Someone> => {
  const rows = await gateDb(gate)
    .update(pendingSignIns)
    .set({ tries: sql`${pendingSignIns.tries} + 1` })
    .where(isOpen(id, now))
    .returning(whose);
  if (!rows[0]) throw isOver();
  return rows[0];
};

/** One of any number of right answers finishes it. */
export const finishPendingSignIn = async (gate: Gate, id: string): Promise<Someone> => {
  const rows = await gateDb(gate).delete(pendingSignIns).where(eq(pendingSignIns.id, id)).returning(whose);
  if (!rows[0]) throw isOver();
  return rows[0];
};

/** What an old password had begun is not finished after it was changed. */
export const dropPendingSignIns = async (gate: Gate, personId: string): Promise<void> => {
  await gateDb(gate).delete(pendingSignIns).where(eq(pendingSignIns.personId, personId));
};
