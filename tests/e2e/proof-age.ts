import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import pg from 'pg';
import type { Product } from '#tests/support/product.ts';

/**
 * Makes it ten minutes since anybody proved who they are, so that the next sensitive act asks again: a test cannot
 * wait for so long, and the server's clock is not a browser's to move.
 */
export const ageProofs = async ({ local }: Product): Promise<void> => {
  const { gatePassword } = JSON.parse(readFileSync(join(local, 'secrets.json'), 'utf8')) as {
    gatePassword: string;
  };
  const port = Number(readFileSync(join(local, 'cluster', 'port'), 'utf8'));
  const client = new pg.Client({
    host: '127.0.0.1',
    port,
    database: 'espalier',
    user: 'espalier_gate',
    password: gatePassword,
  });
  await client.connect();
  try {
    await client.query(`update signed_in_sessions set proven_at = proven_at - interval '10 minutes'`);
  } finally {
    await client.end();
  }
};
