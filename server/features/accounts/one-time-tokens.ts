import { createHmac, timingSafeEqual } from 'node:crypto';
import { and, eq, gt, isNull } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type pg from 'pg';
import { oneTimeTokens } from '../../db/schema/gate.ts';

type TokenRow = typeof oneTimeTokens.$inferSelect;
type TokenKind = TokenRow['kind'];

/** A connection of the gate, or a transaction on one. */
export type Gate = pg.Pool | pg.PoolClient;

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

const macOf = (secret: string, purpose: string, text: string): Buffer =>
  createHmac('sha256', secret).update(`${purpose}:${text}`).digest();

/**
 * The secret of a one-time link: the id, and a keyed hash of it (256 bits). Nothing of it is stored, so a copy
 * of the database opens nothing, and a mail can be made again without keeping what it held.
 */
export const linkTokenOf = (secret: string, id: string): string =>
  `${id}.${macOf(secret, 'link', id).toString('base64url')}`;

/** The id that a link's secret names; null where it was not made here. */
export const idOfLinkToken = (secret: string, token: string): string | null => {
  const [id = ''] = token.split('.');
  const given = Buffer.from(token);
  const expected = Buffer.from(linkTokenOf(secret, id));
  return given.length === expected.length && timingSafeEqual(given, expected) ? id : null;
};

/** Crockford's base 32: no I, L, O or U, which are read as 1, 1, 0 and V. */
const alphabet = '0123456789ABCDEFGHJKMNPQRSTVWXYZ';
const codeLength = 10;

/** The short code of a letter, 50 bits, in two groups of five. */
export const shortCodeOf = (secret: string, id: string): string => {
  const bytes = macOf(secret, 'code', id);
  const letters = Array.from({ length: codeLength }, (_, index) => alphabet[(bytes[index] ?? 0) % 32]).join(
    '',
  );
  return `${letters.slice(0, 5)}-${letters.slice(5)}`;
};

/** What is looked up: a keyed hash of the code, however it was written. */
export const codeHashOf = (secret: string, code: string): string => {
  const plain = code
    .toUpperCase()
    .replace(/[^0-9A-Z]/g, '')
    .replaceAll('I', '1')
    .replaceAll('L', '1')
    .replaceAll('O', '0')
    .replaceAll('U', 'V');
  return macOf(secret, 'code-hash', plain).toString('base64url');
};

export const issueToken = async (
  gate: Gate,
  token: {
    id: string;
    clinicId: string;
    personId: string;
    kind: TokenKind;
    expiresAt: Date;
    codeHash?: string;
    email?: string;
  },
  now: Date,
): Promise<void> => {
  await gateDb(gate)
    .insert(oneTimeTokens)
    .values({ ...token, createdAt: now });
};

export const tokenById = async (gate: Gate, id: string): Promise<TokenRow | null> => {
  const rows = await gateDb(gate).select().from(oneTimeTokens).where(eq(oneTimeTokens.id, id));
  return rows[0] ?? null;
};

export const tokenByCodeHash = async (gate: Gate, codeHash: string): Promise<TokenRow | null> => {
  const rows = await gateDb(gate).select().from(oneTimeTokens).where(eq(oneTimeTokens.codeHash, codeHash));
  return rows[0] ?? null;
};

/** Uses a token up. Of any number of tries at once one gets it; the others, and whoever is late, get null. */
export const useToken = async (
  gate: Gate,
  id: string,
  kind: TokenKind,
  now: Date,
): Promise<TokenRow | null> => {
  const rows = await gateDb(gate)
    .update(oneTimeTokens)
    .set({ usedAt: now })
    .where(
      and(
        eq(oneTimeTokens.id, id),
        eq(oneTimeTokens.kind, kind),
        isNull(oneTimeTokens.usedAt),
        isNull(oneTimeTokens.revokedAt),
        gt(oneTimeTokens.expiresAt, now),
      ),
    )
    .returning();
  return rows[0] ?? null;
};

/** What was issued to a person before opens nothing any more. */
export const revokeTokens = async (
  gate: Gate,
  personId: string,
  kind: TokenKind,
  now: Date,
): Promise<void> => {
  await gateDb(gate)
    .update(oneTimeTokens)
    .set({ revokedAt: now })
    .where(
      and(
        eq(oneTimeTokens.personId, personId),
        eq(oneTimeTokens.kind, kind),
        isNull(oneTimeTokens.usedAt),
        isNull(oneTimeTokens.revokedAt),
      ),
    );
};
