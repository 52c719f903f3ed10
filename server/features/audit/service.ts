import type { ActingAs } from '../../db/actor.ts';
import { auditEntries } from '../../db/schema/audit.ts';
import type { Tx } from '../../db/with-tx.ts';

export type AuditFact = {
  action: string;
  subjectId?: string;
  patientId?: string;
  detail?: Record<string, string | number | boolean | null>;
};

const joinWindowMs = 5 * 60_000;

type Inside = Exclude<ActingAs, { kind: 'anonymous' }>;

const entryFor = (actor: Inside, fact: AuditFact, now: Date) => ({
  clinicId: actor.clinicId,
  at: now,
  actorKind: actor.kind,
  personId: actor.kind === 'person' ? actor.personId : null,
  ...fact,
});

/** One entry, in the transaction of what it records: both are there or neither is. */
export const writeAudit = async (tx: Tx, actor: Inside, fact: AuditFact, now: Date): Promise<void> => {
  await tx.insert(auditEntries).values(entryFor(actor, fact, now));
};

/**
 * The opening of a chart, or of a list under its clinic's id: screens fetch it again at each return to them. The
 * same person opening the same within five minutes makes no second entry; what differs in detail is not the same.
 */
export const auditOpening = async (
  tx: Tx,
  actor: Inside,
  fact: AuditFact & { subjectId: string },
  now: Date,
): Promise<void> => {
  const window = Math.floor(now.getTime() / joinWindowMs);
  const who = actor.kind === 'person' ? actor.personId : actor.kind;
  const detail = Object.values(fact.detail ?? {}).map((value) => `:${value}`);
  const joinKey = `${fact.action}:${who}:${fact.subjectId}:${window}${detail.join('')}`;
  await tx
    .insert(auditEntries)
    .values({ ...entryFor(actor, fact, now), joinKey })
    .onConflictDoNothing();
};
