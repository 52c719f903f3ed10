import { and, eq, isNotNull, isNull, lt, or, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { authenticators } from '../../db/schema/gate.ts';
import type { Site } from '../../http/site.ts';
import type { Gate } from './one-time-tokens.ts';
import { authenticatorPurpose, seal, unseal } from './sealing.ts';
import { newTotpSecret, stepOfCode } from './totp.ts';

type Someone = { clinicId: string; personId: string };

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

const authenticatorOf = async (gate: Gate, personId: string) => {
  const rows = await gateDb(gate).select().from(authenticators).where(eq(authenticators.personId, personId));
  return rows[0] ?? null;
};

/**
 * A new secret that waits for its first code. A confirmed app goes on until then, so that nobody is locked out
 * by a change of phones that was begun and not finished.
 */
export const beginAuthenticator = async (site: Site, { clinicId, personId }: Someone): Promise<string> => {
  const secret = newTotpSecret();
  const sealedSecret = seal(site.sealSecret, authenticatorPurpose, secret);
  const { confirmedAt } = authenticators;
  await gateDb(site.gate)
    .insert(authenticators)
    .values({ clinicId, personId, sealedSecret })
    .onConflictDoUpdate({
      target: authenticators.personId,
      set: {
        sealedSecret: sql`case when ${confirmedAt} is null then ${sealedSecret} else ${authenticators.sealedSecret} end`,
        nextSealedSecret: sql`case when ${confirmedAt} is null then null else ${sealedSecret} end`,
      },
    });
  return secret;
};

/** What a first code came to: the app holds the secret, it does not, or nothing waits for a code. */
type Confirmation = 'confirmed' | 'wrong' | 'nothing-waits';

/** A first code confirms the secret that waits, once, and counts as used. */
export const confirmAuthenticatorOf = async (
  site: Site,
  personId: string,
  code: string,
  now: Date,
): Promise<Confirmation> => {
  const row = await authenticatorOf(site.gate, personId);
  const waiting = row?.confirmedAt ? row.nextSealedSecret : row?.sealedSecret;
  if (!row || !waiting) return 'nothing-waits';
  const step = stepOfCode(unseal(site.sealSecret, authenticatorPurpose, waiting), code, now);
  if (step === null) return 'wrong';
  const stillWaits = row.confirmedAt
    ? eq(authenticators.nextSealedSecret, waiting)
    : and(isNull(authenticators.confirmedAt), eq(authenticators.sealedSecret, waiting));
  const rows = await gateDb(site.gate)
    .update(authenticators)
    .set({ sealedSecret: waiting, nextSealedSecret: null, confirmedAt: now, lastStep: step })
    .where(and(eq(authenticators.personId, personId), stillWaits))
    .returning({ personId: authenticators.personId });
  return rows.length > 0 ? 'confirmed' : 'nothing-waits';
};

/** Whether a code is right and counts; each counts once, and none after a later one (RFC 6238, section 5.2). */
export const acceptAuthenticatorCode = async (
  site: Site,
  personId: string,
  code: string,
  now: Date,
): Promise<boolean> => {
  const row = await authenticatorOf(site.gate, personId);
  if (!row?.confirmedAt) return false;
  const step = stepOfCode(unseal(site.sealSecret, authenticatorPurpose, row.sealedSecret), code, now);
  if (step === null) return false;
  const rows = await gateDb(site.gate)
    .update(authenticators)
    .set({ lastStep: step })
    .where(
      and(
        eq(authenticators.personId, personId),
        eq(authenticators.sealedSecret, row.sealedSecret),
        isNotNull(authenticators.confirmedAt),
        or(isNull(authenticators.lastStep), lt(authenticators.lastStep, step)),
      ),
    )
    .returning({ personId: authenticators.personId });
  return rows.length > 0;
};

export const hasAuthenticator = async (gate: Gate, personId: string): Promise<boolean> => {
  const row = await authenticatorOf(gate, personId);
  return row !== null && row.confirmedAt !== null;
};

/** False where there was none, or none that was confirmed. */
export const deleteAuthenticator = async (gate: Gate, personId: string): Promise<boolean> => {
  const rows = await gateDb(gate)
    .delete(authenticators)
    .where(eq(authenticators.personId, personId))
    .returning({ confirmedAt: authenticators.confirmedAt });
  return rows.some(({ confirmedAt }) => confirmedAt !== null);
};
