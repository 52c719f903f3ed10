import { and, eq, inArray, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { closeFlagBody, FlagRow } from '#shared/triage/contract.ts';
import { afterMove, flagStates, type FlagMove, type FlagState } from '#shared/triage/lifecycle.ts';
import type { PersonActor } from '../../db/actor.ts';
import { flags } from '../../db/schema/flags.ts';
import type { Tx } from '../../db/with-tx.ts';
import { writeAudit } from '../audit/service.ts';
import { replyAboutFlag } from '../threads/starting.ts';
import { newestRaisingOf } from './looks.ts';
import { flagVisibleTo, nameOf, patientPersonOf, type FlagRecord } from './queries.ts';
import { flagRowOf } from './round.ts';
import { addFlagEvent, announceAlerts, announceFlag } from './service.ts';

/** The states in which a move exists, for the guard of its update. */
const statesWith = (move: FlagMove): FlagState[] =>
  flagStates.filter((state) => afterMove(state, move) !== null);

/** Why a guarded update found nothing to change, said to the one who asked. */
const refusalOf = async (tx: Tx, actor: PersonActor, flagId: string): Promise<Problem> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  if (flag.state === 'claimed' && flag.claimedBy && flag.claimedBy !== actor.personId) {
    const claimedBy = await nameOf(tx, actor.clinicId, flag.claimedBy);
    return new Problem('claimed-by-other', `${claimedBy} has claimed this flag.`, { claimedBy });
  }
  return new Problem('state-conflict', `This flag is ${flag.state}.`);
};

/** One person holds a flag: whoever's update comes first. Claiming what one holds already changes nothing. */
const tryClaim = async (tx: Tx, actor: PersonActor, flag: FlagRecord, now: Date): Promise<boolean> => {
  const claimed = await tx
    .update(flags)
    .set({ state: 'claimed', claimedBy: actor.personId, claimedAt: now })
    .where(
      and(
        eq(flags.clinicId, flag.clinicId),
        eq(flags.id, flag.id),
        inArray(flags.state, statesWith('claim')),
      ),
    )
    .returning({ id: flags.id });
  if (claimed.length === 0) return false;
  await addFlagEvent(tx, flag, { kind: 'claimed', byPersonId: actor.personId }, now);
  await announceFlag(tx, flag);
  await announceAlerts(tx, flag);
  return true;
};

export const claim = async (tx: Tx, actor: PersonActor, flagId: string, now: Date): Promise<FlagRow> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  if (!(await tryClaim(tx, actor, flag, now))) {
    const current = await flagVisibleTo(tx, actor, flagId);
    const isMine = current.state === 'claimed' && current.claimedBy === actor.personId;
    if (!isMine) throw await refusalOf(tx, actor, flagId);
  }
  await writeAudit(tx, actor, { action: 'flag.claimed', subjectId: flag.id, patientId: flag.patientId }, now);
  return flagRowOf(tx, actor, flagId, now);
};

export const release = async (tx: Tx, actor: PersonActor, flagId: string, now: Date): Promise<FlagRow> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  const released = await tx
    .update(flags)
    .set({ state: 'open', claimedBy: null, claimedAt: null })
    .where(
      and(
        eq(flags.clinicId, flag.clinicId),
        eq(flags.id, flag.id),
        inArray(flags.state, statesWith('release')),
        eq(flags.claimedBy, actor.personId),
      ),
    )
    .returning({ id: flags.id });
  if (released.length === 0) throw await refusalOf(tx, actor, flagId);
  await addFlagEvent(tx, flag, { kind: 'released', byPersonId: actor.personId }, now);
  await writeAudit(
    tx,
    actor,
    { action: 'flag.released', subjectId: flag.id, patientId: flag.patientId },
    now,
  );
  await announceFlag(tx, flag);
  return flagRowOf(tx, actor, flagId, now);
};

/** Closes an open flag, or one's own. A colleague's claim is not closed over their head. */
export const close = async (
  tx: Tx,
  actor: PersonActor,
  { flagId, outcome, worthRaising, note }: { flagId: string } & z.output<typeof closeFlagBody>,
  now: Date,
): Promise<FlagRow> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  if (flag.state === 'claimed' && flag.claimedBy !== actor.personId) throw await refusalOf(tx, actor, flagId);
  const closed = await tx
    .update(flags)
    .set({ state: 'closed', closedAt: now, outcome, worthRaising })
    .where(
      and(
        eq(flags.clinicId, flag.clinicId),
        eq(flags.id, flag.id),
        inArray(flags.state, statesWith('close')),
        // What was looked at above must still be so: a claim in between wins.
        eq(flags.state, flag.state),
        flag.claimedBy === null ? isNull(flags.claimedBy) : eq(flags.claimedBy, flag.claimedBy),
      ),
    )
    .returning({ id: flags.id });
  if (closed.length === 0) throw await refusalOf(tx, actor, flagId);
  await addFlagEvent(
    tx,
    flag,
    { kind: 'closed', byPersonId: actor.personId, detail: outcome, note: note || null },
    now,
  );
  await writeAudit(
    tx,
    actor,
    { action: 'flag.closed', subjectId: flag.id, patientId: flag.patientId, detail: { outcome } },
    now,
  );
  await announceFlag(tx, flag);
  return flagRowOf(tx, actor, flagId, now);
};

/** This clinician has the case on the screen. Recorded once per person and raising; the patient is told who. */
export const see = async (tx: Tx, actor: PersonActor, flagId: string, now: Date): Promise<void> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  const detail = await newestRaisingOf(tx, flag);
  const isFirstTime = await addFlagEvent(tx, flag, { kind: 'seen', byPersonId: actor.personId, detail }, now);
  await writeAudit(tx, actor, { action: 'flag.seen', subjectId: flag.id, patientId: flag.patientId }, now);
  if (!isFirstTime) return;
  await announceFlag(tx, flag);
  await announceAlerts(tx, flag);
};

const subjectFor = (flag: FlagRecord, timeZone: string): string => {
  const date = new Date(`${localDateIn(timeZone, flag.raisedAt)}T12:00:00Z`);
  const words = new Intl.DateTimeFormat('en-US', { day: 'numeric', month: 'long', timeZone: 'UTC' }).format(
    date,
  );
  return `Your check-in on ${words}`;
};

/** Writes to the patient about a flag; an open flag is claimed by it. */
export const reply = async (
  tx: Tx,
  actor: PersonActor,
  { flagId, id, text }: { flagId: string; id: string; text: string },
  now: Date,
): Promise<{ threadId: string; messageId: string; sequence: number }> => {
  const flag = await flagVisibleTo(tx, actor, flagId);
  const { personId: patientPersonId, timeZone } = await patientPersonOf(tx, actor.clinicId, flag.patientId);
  const about = {
    id: flag.id,
    patientId: flag.patientId,
    patientPersonId,
    subject: subjectFor(flag, timeZone),
  };
  await tryClaim(tx, actor, flag, now);
  const message = await replyAboutFlag(tx, actor, about, { id, text }, now);
  await addFlagEvent(tx, flag, { kind: 'replied', byPersonId: actor.personId, detail: message.id }, now);
  await announceFlag(tx, flag);
  return { threadId: message.threadId, messageId: message.id, sequence: message.sequence };
};
