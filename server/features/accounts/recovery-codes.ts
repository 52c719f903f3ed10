import { randomBytes, randomUUID } from 'node:crypto';
import { and, count, eq, isNull } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { recoveryCodes } from '../../db/schema/gate.ts';
import type { Site } from '../../http/site.ts';
import { codeHashOf, shortCodeOf, type Gate } from './one-time-tokens.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

const codesInASet = 10;

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

/** Written like the code of a letter, and made of a key that nobody keeps: 50 bits of chance. */
const newCode = (): string => shortCodeOf(randomBytes(32).toString('hex'), randomUUID());

/** So many bits need no slow hash; the key makes a copy of the table worth nothing. */
const hashOf = ({ sealSecret }: Site, code: string): string => codeHashOf(sealSecret, code);

/** A new set, readable this once. The one before opens nothing any more, used or not. */
export const replaceRecoveryCodes = (
  site: Site,
  { clinicId, personId }: { clinicId: string; personId: string },
): Promise<string[]> =>
  withWaysInLocked(site.gate, personId, async (gate) => {
    const codes = Array.from({ length: codesInASet }, newCode);
    await gateDb(gate).delete(recoveryCodes).where(eq(recoveryCodes.personId, personId));
    await gateDb(gate)
      .insert(recoveryCodes)
      .values(codes.map((code) => ({ clinicId, personId, codeHash: hashOf(site, code) })));
    return codes;
  });

export const deleteRecoveryCodes = async (gate: Gate, personId: string): Promise<void> => {
  await gateDb(gate).delete(recoveryCodes).where(eq(recoveryCodes.personId, personId));
};

/** Uses a code up. Of any number of tries at once one gets it. */
export const useRecoveryCode = async (
  site: Site,
  personId: string,
  code: string,
  now: Date,
): Promise<boolean> => {
  const rows = await gateDb(site.gate)
    .update(recoveryCodes)
    .set({ usedAt: now })
    .where(
      and(
        eq(recoveryCodes.personId, personId),
        eq(recoveryCodes.codeHash, hashOf(site, code)),
        isNull(recoveryCodes.usedAt),
      ),
    )
    .returning({ id: recoveryCodes.id });
  return rows.length > 0;
};

export const recoveryCodesLeft = async (gate: Gate, personId: string): Promise<number> => {
  const rows = await gateDb(gate)
    .select({ left: count() })
    .from(recoveryCodes)
    .where(and(eq(recoveryCodes.personId, personId), isNull(recoveryCodes.usedAt)));
  return rows[0]?.left ?? 0;
};
