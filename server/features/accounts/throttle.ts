import { createHash } from 'node:crypto';
import type pg from 'pg';

type Limits = { freeFailures: number; firstWaitSeconds: number; longestWaitSeconds: number };

/** So many failures are free; the last of them brings 30 s, each further one twice as much, up to an hour. */
const signInLimits: Limits = { freeFailures: 5, firstWaitSeconds: 30, longestWaitSeconds: 3600 };
/** A day without a failure forgets the earlier ones. */
const forgetAfter = '24 hours';

const keyOf = (email: string): string => createHash('sha256').update(email).digest('base64url');

/**
 * Admits one try or says how long to wait. The try is counted before the password is looked at, in one
 * statement, so that a hundred tries at once are admitted one by one like any others. Known and unknown
 * e-mails are counted alike.
 */
export const admitTry = async (
  gate: pg.Pool,
  email: string,
  now: Date,
  { freeFailures, firstWaitSeconds, longestWaitSeconds }: Limits = signInLimits,
): Promise<{ admitted: true } | { admitted: false; retryAfterSeconds: number }> => {
  const key = keyOf(email);
  const { rowCount } = await gate.query(
    `insert into sign_in_attempts as a (email_hash, failures, blocked_until, last_at)
     values ($1, 1, $2, $2)
     on conflict (email_hash) do update set
       failures = case when a.last_at < $2::timestamptz - interval '${forgetAfter}' then 1 else a.failures + 1 end,
       blocked_until = $2::timestamptz + case
         when a.last_at < $2::timestamptz - interval '${forgetAfter}' or a.failures + 1 < $3 then interval '0'
         else make_interval(secs => least($4 * power(2, least(a.failures + 1 - $3, 20)), $5))
       end,
       last_at = $2
     where a.blocked_until <= $2`,
    [key, now, freeFailures, firstWaitSeconds, longestWaitSeconds],
  );
  if (rowCount === 1) return { admitted: true };
  const { rows } = await gate.query<{ seconds: number }>(
    `select ceil(extract(epoch from blocked_until - $2::timestamptz))::int as seconds
     from sign_in_attempts where email_hash = $1`,
    [key, now],
  );
  return { admitted: false, retryAfterSeconds: Math.max(1, rows[0]?.seconds ?? firstWaitSeconds) };
};

/** A success forgets the failures before it. */
export const forgetTries = async (gate: pg.Pool, email: string): Promise<void> => {
  await gate.query('delete from sign_in_attempts where email_hash = $1', [keyOf(email)]);
};
