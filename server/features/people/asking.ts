import { and, eq, sql } from 'drizzle-orm';
import type { Role } from '#shared/access/permissions.ts';
import type { TwoPersonActKind } from '#shared/people/two-person-acts.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { twoPersonActs } from '../../db/schema/invitations.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';
import { activeHolders } from './queries.ts';

/** Asks for what a second person decides, and tells those who may. The caller holds the turn. */
export const askForAct = async (
  tx: Tx,
  actor: PersonActor,
  act: { kind: TwoPersonActKind; personId: string; role: Role | null; reason: string },
  now: Date,
): Promise<void> => {
  const { clinicId, personId: requestedBy } = actor;
  const waiting = await tx.$count(
    twoPersonActs,
    and(
      eq(twoPersonActs.clinicId, clinicId),
      eq(twoPersonActs.kind, act.kind),
      eq(twoPersonActs.personId, act.personId),
      sql`${twoPersonActs.role} is not distinct from ${act.role}`,
      eq(twoPersonActs.state, 'waiting'),
    ),
  );
  if (waiting > 0) throw new Problem('state-conflict', 'This waits for a second person already.');
  const rows = await tx
    .insert(twoPersonActs)
    .values({ ...act, clinicId, state: 'waiting', requestedBy, requestedAt: now })
    .returning({ id: twoPersonActs.id });
  const asked = rows[0];
  if (!asked) throw new Error('The act was not written.');
  const deciders = await activeHolders(
    tx,
    clinicId,
    ['administrator', 'clinical-lead'],
    [requestedBy, act.personId],
  );
  const told = {
    kind: 'two-person-act',
    occasion: `two-person-act:${asked.id}`,
    path: '/clinic/confirmations',
  } as const;
  await notify(tx, clinicId, deciders, told, now);
};
