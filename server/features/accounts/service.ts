import { eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type pg from 'pg';
import type { Me } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { credentials } from '../../db/schema/gate.ts';
import type { Tx } from '../../db/with-tx.ts';
import { timesOf, type SignedIn } from '../../http/sessions.ts';
import { clinicCardOf } from '../clinic/queries.ts';
import { verifyPassword } from './passwords.ts';
import { personOf } from './queries.ts';
import { admitTry, forgetTries } from './throttle.ts';

const normaliseEmail = (email: string): string => email.trim().normalize('NFC').toLowerCase();

/** Who an e-mail and a password belong to; null where they do not match, known account or not. */
export const checkPassword = async (
  gate: pg.Pool,
  { email, password }: { email: string; password: string },
  now: Date,
): Promise<{ clinicId: string; personId: string } | null> => {
  const address = normaliseEmail(email);
  const attempt = await admitTry(gate, address, now);
  if (!attempt.admitted) {
    throw new Problem('too-many-attempts', undefined, { retryAfter: attempt.retryAfterSeconds });
  }
  const rows = await drizzle({ client: gate, casing: 'snake_case' })
    .select()
    .from(credentials)
    .where(eq(credentials.email, address));
  const known = rows[0] ?? null;
  if (!(await verifyPassword(known?.passwordHash ?? null, password)) || !known) return null;
  await forgetTries(gate, address);
  return { clinicId: known.clinicId, personId: known.personId };
};

/** The screen's view of who is signed in. A left shoulder leaves the right hand free, and the other way round. */
export const describeMe = async (
  tx: Tx,
  actor: PersonActor,
  session: SignedIn,
  writeToken: string,
  now: Date,
): Promise<Me> => {
  const person = await personOf(tx, actor);
  return {
    personId: actor.personId,
    name: person.name,
    roles: actor.roles,
    clinic: await clinicCardOf(tx, actor.clinicId, now),
    patient:
      actor.patientId && person.arm
        ? { id: actor.patientId, arm: person.arm, controlsTowards: person.arm === 'left' ? 'right' : 'left' }
        : null,
    session: timesOf(session),
    writeToken,
  };
};
