import { and, eq } from 'drizzle-orm';
import { consequences } from '#shared/patients/states.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Pools } from '../../db/pools.ts';
import { patients } from '../../db/schema/patients.ts';
import { withTx, type Tx } from '../../db/with-tx.ts';
import { loadPersonActor } from './queries.ts';

type Someone = { clinicId: string; personId: string };

/** A patient whose care has ended does not come in, unless they are here as somebody else as well. */
const mayEnter = async (tx: Tx, { clinicId, personId, roles }: PersonActor): Promise<boolean> => {
  if (roles.some((role) => role !== 'patient')) return true;
  const rows = await tx
    .select({ state: patients.state })
    .from(patients)
    .where(and(eq(patients.clinicId, clinicId), eq(patients.personId, personId)));
  return rows.every(({ state }) => consequences[state].signIn);
};

/** Somebody with the roles they hold now; null where they may not sign in (any more). */
export const actorEntering = (pools: Pools, { clinicId, personId }: Someone): Promise<PersonActor | null> => {
  const person = { kind: 'person', clinicId, personId } as const;
  return withTx(pools.app, person, async (tx) => {
    const actor = await loadPersonActor(tx, person);
    return actor && (await mayEnter(tx, actor)) ? actor : null;
  });
};
