import { and, asc, eq } from 'drizzle-orm';
import { compareUrgency, highestUrgency, type Finding, type Urgency } from '#shared/red-flags/findings.ts';
import type { NotificationKind } from '#shared/notifications/kinds.ts';
import { covers } from '#shared/red-flags/told.ts';
import type { SystemActor } from '../../db/actor.ts';
import { findings as findingRows, flags } from '../../db/schema/flags.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';
import { writeAudit } from '../audit/service.ts';
import { peopleToTell } from './people-to-tell.ts';
import type { FlagRecord } from './queries.ts';
import { addFlagEvent, announceFlag } from './service.ts';

/** What was evaluated: a finished check-in, or an alert that somebody sent by a tick. */
export type FlagSource = {
  kind: 'check-in' | 'alert';
  /** The row of the check-in or alert. */
  id: string;
  patientId: string;
  authorId: string;
  checkInClientId: string;
  receivedAt: Date;
};

const isSerious = ({ urgency }: { urgency: Urgency }): boolean =>
  urgency === 'emergency' || urgency === 'urgent';

const reopening = {
  state: 'open',
  claimedBy: null,
  claimedAt: null,
  closedAt: null,
  outcome: null,
  worthRaising: null,
} as const;

const knownFindings = (tx: Tx, flag: FlagRecord): Promise<(Finding & { toldAt: Date })[]> =>
  tx
    .select({
      code: findingRows.code,
      ruleVersion: findingRows.ruleVersion,
      urgency: findingRows.urgency,
      values: findingRows.values,
      toldAt: findingRows.toldAt,
    })
    .from(findingRows)
    .where(and(eq(findingRows.clinicId, flag.clinicId), eq(findingRows.flagId, flag.id)))
    .orderBy(asc(findingRows.toldAt));

/** Every source keeps its own findings: what an alert has told stays, whatever the finished check-in says. */
const keepFindings = async (
  tx: Tx,
  flag: FlagRecord,
  source: FlagSource,
  found: readonly Finding[],
): Promise<void> => {
  await tx
    .insert(findingRows)
    .values(
      found.map((finding) => ({
        clinicId: flag.clinicId,
        flagId: flag.id,
        sourceId: source.id,
        ...finding,
        toldAt: source.receivedAt,
      })),
    )
    .onConflictDoNothing();
};

const kinds = {
  emergency: 'new-emergency',
  urgent: 'new-urgent',
  'same-day': 'new-flag',
  routine: 'new-flag',
} as const satisfies Record<Urgency, NotificationKind>;

const tellClinicians = async (
  tx: Tx,
  { clinicId, patientId, id }: FlagRecord,
  source: FlagSource,
  urgency: Urgency,
  now: Date,
): Promise<void> => {
  const withOnCall = isSerious({ urgency });
  const personIds = await peopleToTell(tx, { clinicId, patientId, withOnCall });
  const kind = kinds[urgency];
  const occasion = `flag:${id}:${source.kind}:${source.id}`;
  await notify(tx, clinicId, personIds, { kind, occasion, path: `/round/${id}` }, now);
};

/**
 * Adds to a flag that is there already. An alert is somebody's tick just now, so an emergency or urgent one is
 * told again every time, also when the flag was closed or called a mistake before. A finished check-in is told
 * again for a new emergency or urgent finding, and opens a closed flag for anything that nobody has seen.
 */
const addToFlag = async (
  tx: Tx,
  actor: SystemActor,
  flag: FlagRecord,
  source: FlagSource,
  found: readonly Finding[],
  now: Date,
): Promise<void> => {
  const known = await knownFindings(tx, flag);
  await keepFindings(tx, flag, source, found);
  const unseen = found.filter((finding) => !known.some((before) => covers(before, finding)));
  const isNewRule = ({ code, urgency }: Finding) =>
    !known.some((before) => before.code === code && compareUrgency(before.urgency, urgency) <= 0);
  // Unless its own check-in was finished and evaluated first, an alert is later than all that is known.
  const isTickedSince = (finding: Finding) =>
    !known.some((before) => covers(before, finding) && before.toldAt >= source.receivedAt);
  const isAgain = source.kind === 'alert' ? isTickedSince : isNewRule;
  const again = found.some((finding) => isSerious(finding) && isAgain(finding));
  const reopens = flag.state === 'closed' && (again || unseen.length > 0);
  const urgency = highestUrgency([flag, ...found]) ?? flag.urgency;
  if (urgency !== flag.urgency || reopens) {
    await tx
      .update(flags)
      .set({ urgency, ...(reopens ? reopening : {}) })
      .where(and(eq(flags.clinicId, flag.clinicId), eq(flags.id, flag.id)));
  }
  if (again || reopens || urgency !== flag.urgency) {
    const told = highestUrgency(again || reopens ? found : [{ urgency }]) ?? urgency;
    await addFlagEvent(tx, flag, { kind: 'raised-again', detail: told }, now);
    await tellClinicians(tx, flag, source, told, now);
  }
  if (unseen.length > 0 || again) {
    await writeAudit(
      tx,
      actor,
      { action: 'flag.added-to', subjectId: flag.id, patientId: flag.patientId },
      now,
    );
  }
};

/**
 * Raises the flag of a check-in, or adds to the one that its alert raised. Exactly one per source: the unique
 * key decides, not a look beforehand. What is found may raise its urgency, nothing lowers it.
 */
export const raiseFlag = async (
  tx: Tx,
  actor: SystemActor,
  source: FlagSource,
  found: readonly Finding[],
  now: Date,
): Promise<void> => {
  const urgency = highestUrgency(found);
  if (!urgency) return;
  const { clinicId } = actor;
  const keys = { sourceAuthorId: source.authorId, sourceClientId: source.checkInClientId };
  const inserted = await tx
    .insert(flags)
    .values({ clinicId, patientId: source.patientId, ...keys, urgency, raisedAt: source.receivedAt })
    .onConflictDoNothing()
    .returning();
  const made = inserted[0];
  if (made) {
    await keepFindings(tx, made, source, found);
    await addFlagEvent(tx, made, { kind: 'raised', detail: urgency }, now);
    await writeAudit(
      tx,
      actor,
      { action: 'flag.raised', subjectId: made.id, patientId: made.patientId },
      now,
    );
    await tellClinicians(tx, made, source, urgency, now);
    await announceFlag(tx, made);
    return;
  }
  const existing = await tx
    .select()
    .from(flags)
    .where(
      and(
        eq(flags.clinicId, clinicId),
        eq(flags.sourceAuthorId, keys.sourceAuthorId),
        eq(flags.sourceClientId, keys.sourceClientId),
      ),
    )
    .for('update');
  const flag = existing[0];
  if (!flag) throw new Error('A flag that exists could not be read.');
  await addToFlag(tx, actor, flag, source, found, now);
  await announceFlag(tx, flag);
};
