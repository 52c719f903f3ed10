import { eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type pg from 'pg';
import { isStaff } from '#shared/access/permissions.ts';
import type { Me } from '#shared/accounts/contract.ts';
import { stateOn } from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { credentials } from '../../db/schema/gate.ts';
import type { Tx } from '../../db/with-tx.ts';
import { timesOf, type SignedIn } from '../../http/sessions.ts';
import { clinicCardOf } from '../clinic/queries.ts';
import { verifyPassword } from './passwords.ts';
import { careGrants, personOf, recordCardRow } from './queries.ts';
import { admitTry, forgetTries } from './throttle.ts';

export const normaliseEmail = (email: string): string => email.trim().normalize('NFC').toLowerCase();

/** Who an e-mail and a password belong to; null where they do not match, known account or not. */
export const checkPassword = async (
  gate: pg.Pool,
  { email, password, from }: { email: string; password: string; from?: string },
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
  if (!(await verifyPassword(known?.passwordHash ?? null, password, from)) || !known) return null;
  await forgetTries(gate, address);
  return { clinicId: known.clinicId, personId: known.personId };
};

type RecordRow = NonNullable<Awaited<ReturnType<typeof recordCardRow>>>;

/** A left shoulder leaves the right hand free, and the other way round. */
const toRecordCard = ({ id, arm, state, stateSince, surgeryDate, timeZone }: RecordRow, now: Date) => ({
  id,
  arm,
  controlsTowards: arm === 'left' ? ('right' as const) : ('left' as const),
  state: stateOn(state, surgeryDate, localDateIn(timeZone, now)),
  stateSince: stateSince?.toISOString() ?? null,
});

/** The screen's view of who is signed in, and of whose records they may act on. */
export const describeMe = async (
  tx: Tx,
  actor: PersonActor,
  session: SignedIn,
  writeToken: string,
  now: Date,
): Promise<Me> => {
  const person = await personOf(tx, actor);
  const secondFactor = !isStaff(actor.roles) ? 'not-needed' : session.secondFactor ? 'given' : 'missing';
  // A password alone shows staff nothing of a record, not even of their own or of those they look after.
  const opensRecords = secondFactor !== 'missing';
  const own =
    opensRecords && actor.patientId ? await recordCardRow(tx, actor.clinicId, actor.patientId) : null;
  const grants = opensRecords ? await careGrants(tx, actor, now) : [];
  const caresFor: Me['caresFor'] = [];
  for (const { patientId, name, mayCheckIn, mayMessage, until } of grants) {
    const row = await recordCardRow(tx, actor.clinicId, patientId);
    if (row) caresFor.push({ ...toRecordCard(row, now), name, mayCheckIn, mayMessage, until });
  }
  return {
    personId: actor.personId,
    name: person.name,
    email: person.email,
    roles: actor.roles,
    clinic: await clinicCardOf(tx, actor.clinicId, now),
    patient: own ? toRecordCard(own, now) : null,
    caresFor,
    secondFactor,
    session: timesOf(session),
    writeToken,
  };
};
