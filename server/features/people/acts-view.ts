import { and, desc, eq, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { TwoPersonAct } from '#shared/people/contract.ts';
import { twoPersonActs } from '../../db/schema/invitations.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';

/** Acts that a second person decides, as screens show them, newest first. */
export const describeActs = async (
  tx: Tx,
  clinicId: string,
  which: SQL | undefined,
): Promise<TwoPersonAct[]> => {
  const [subject, asker, decider] = [
    alias(people, 'subject'),
    alias(people, 'asker'),
    alias(people, 'decider'),
  ];
  const rows = await tx
    .select({ act: twoPersonActs, subject: subject.name, asker: asker.name, decider: decider.name })
    .from(twoPersonActs)
    .innerJoin(subject, and(eq(subject.clinicId, clinicId), eq(subject.id, twoPersonActs.personId)))
    .innerJoin(asker, and(eq(asker.clinicId, clinicId), eq(asker.id, twoPersonActs.requestedBy)))
    .leftJoin(decider, and(eq(decider.clinicId, clinicId), eq(decider.id, twoPersonActs.decidedBy)))
    .where(and(eq(twoPersonActs.clinicId, clinicId), which))
    .orderBy(desc(twoPersonActs.requestedAt), desc(twoPersonActs.id));
  return rows.map(({ act, ...names }) => ({
    id: act.id,
    kind: act.kind,
    person: { id: act.personId, name: names.subject },
    role: act.role,
    reason: act.reason,
    state: act.state,
    requestedBy: { id: act.requestedBy, name: names.asker },
    requestedAt: act.requestedAt.toISOString(),
    decidedBy: names.decider,
    decidedAt: act.decidedAt?.toISOString() ?? null,
  }));
};
