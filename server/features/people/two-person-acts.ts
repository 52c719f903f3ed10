import { and, eq, gte, or } from 'drizzle-orm';
import type { StaffPerson, TwoPersonAct } from '#shared/people/contract.ts';
import type { TwoPersonActState } from '#shared/people/two-person-acts.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { twoPersonActs } from '../../db/schema/invitations.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { notify } from '../../notifications/service.ts';
import { withWaysInLocked } from '../accounts/ways-in-lock.ts';
import { auditOpening, writeAudit } from '../audit/service.ts';
import { endSessions } from './access.ts';
import { describeActs } from './acts-view.ts';
import { askForAct } from './asking.ts';
import { removeSecondFactors } from './gate.ts';
import { staffMemberOf } from './queries.ts';
import { giveRole, refuseUnfitGrant } from './roles.ts';
import { describeOne } from './staff-view.ts';
import { takeTurn } from './standing.ts';

type ActRow = typeof twoPersonActs.$inferSelect;
type Decision = 'confirm' | 'refuse' | 'withdraw';

const stateAfter: Record<Decision, TwoPersonActState> = {
  confirm: 'confirmed',
  refuse: 'refused',
  withdraw: 'withdrawn',
};

const shownAfterDecisionMs = 90 * 24 * 60 * 60 * 1000;

const conflict = (why: string): Problem => new Problem('state-conflict', why);

export const listActsFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<TwoPersonAct[]> => {
  const since = new Date(now.getTime() - shownAfterDecisionMs);
  const acts = await describeActs(
    tx,
    actor.clinicId,
    or(eq(twoPersonActs.state, 'waiting'), gte(twoPersonActs.decidedAt, since)),
  );
  await auditOpening(tx, actor, { action: 'two-person-acts.listed', subjectId: actor.clinicId }, now);
  return acts;
};

export const askSecondFactorRemoval = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, reason }: { personId: string; reason: string },
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  await staffMemberOf(tx, clinicId, personId);
  await askForAct(tx, actor, { kind: 'remove-second-factor', personId, role: null, reason }, now);
  const fact = { action: 'second-factor.removal-asked', subjectId: personId, detail: { reason } };
  await writeAudit(tx, actor, fact, now);
  return describeOne(tx, site, clinicId, personId, now);
};

/** Two people decide: whoever asked may only withdraw, and nobody decides about themselves. */
const refuseOwnDecision = (act: ActRow, { personId }: PersonActor, decision: Decision): void => {
  const asked = act.requestedBy === personId;
  if (decision === 'withdraw') {
    if (!asked) throw conflict('Only the person who asked for this can withdraw it.');
    return;
  }
  if (asked) throw conflict('You asked for this, so another person decides.');
  if (act.personId === personId) throw conflict('This is about you, so another person decides.');
};

const carryOut = async (tx: Tx, site: Site, act: ActRow, now: Date): Promise<void> => {
  const { clinicId, personId } = act;
  const person = await staffMemberOf(tx, clinicId, personId);
  if (act.kind === 'grant-role') {
    if (act.role === null) throw new Error('A grant without a role.');
    refuseUnfitGrant(person, act.role);
    await giveRole(tx, site, person, act.role, now);
    return;
  }
  await endSessions(tx, site, { clinicId, personId }, now);
  const told = {
    kind: 'sign-in-changed',
    occasion: `second-factor-removed:${act.id}`,
    path: '/clinic/account/sign-in',
  } as const;
  await notify(tx, clinicId, [personId], told, now);
  await withWaysInLocked(site.gate, personId, (gate) => removeSecondFactors(gate, personId));
};

export const decideAct = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { actId, decision }: { actId: string; decision: Decision },
  now: Date,
): Promise<TwoPersonAct> => {
  await takeTurn(tx, actor, 'two-person:decide');
  const { clinicId } = actor;
  const isAct = and(eq(twoPersonActs.clinicId, clinicId), eq(twoPersonActs.id, actId));
  const [act] = await tx.select().from(twoPersonActs).where(isAct);
  if (!act) throw new Problem('not-found');
  refuseOwnDecision(act, actor, decision);
  const decided = await tx
    .update(twoPersonActs)
    .set({ state: stateAfter[decision], decidedBy: actor.personId, decidedAt: now })
    .where(and(isAct, eq(twoPersonActs.state, 'waiting')))
    .returning({ id: twoPersonActs.id });
  if (decided.length === 0) throw conflict('This has been decided already.');
  const detail = { decision, kind: act.kind, role: act.role };
  await writeAudit(tx, actor, { action: 'two-person-act.decided', subjectId: act.personId, detail }, now);
  if (decision === 'confirm') await carryOut(tx, site, act, now);
  const [shown] = await describeActs(tx, clinicId, eq(twoPersonActs.id, actId));
  if (!shown) throw new Error('An act that was just decided is gone.');
  return shown;
};
