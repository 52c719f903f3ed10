import { and, asc, desc, eq, gte, inArray, lte, ne, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { Problem } from '#shared/problems/problems.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { standingFindings } from '#shared/red-flags/told.ts';
import type { PersonActor } from '../../db/actor.ts';
import { alerts, checkIns } from '../../db/schema/check-ins.ts';
import { findings, flagEventKinds, flagEvents, flags } from '../../db/schema/flags.ts';
import { operationCards, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import { threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';

export type FlagRecord = typeof flags.$inferSelect;

/**
 * The one door to a flag: any clinician of the clinic, since whoever is there answers for what was flagged.
 * Routes let clinicians only as far as this.
 */
export const flagVisibleTo = async (tx: Tx, actor: PersonActor, flagId: string): Promise<FlagRecord> => {
  const rows = await tx
    .select()
    .from(flags)
    .where(and(eq(flags.clinicId, actor.clinicId), eq(flags.id, flagId)));
  const flag = rows[0];
  if (!flag) throw new Problem('not-found');
  return flag;
};

const claimer = alias(people, 'claimer');

const selectRows = (tx: Tx) =>
  tx
    .select({
      flag: flags,
      name: people.name,
      timeZone: patients.timeZone,
      arm: operationCards.arm,
      procedure: operationCards.procedure,
      surgeryDate: operationCards.surgeryDate,
      claimedByName: claimer.name,
      calledMistakeAt: sql<string | null>`(
        select to_char(max(e.at) at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') from flag_events e
        where e.clinic_id = ${flags.clinicId} and e.flag_id = ${flags.id} and e.kind = 'ticked-by-mistake')`,
    })
    .from(flags)
    .innerJoin(patients, and(eq(patients.clinicId, flags.clinicId), eq(patients.id, flags.patientId)))
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .leftJoin(claimer, and(eq(claimer.clinicId, flags.clinicId), eq(claimer.id, flags.claimedBy)));

export type RoundRow = Awaited<ReturnType<typeof selectRows>>[number];

/** Everything that is not closed: by urgency, then the oldest first. */
export const openRows = (tx: Tx, clinicId: string): Promise<RoundRow[]> =>
  selectRows(tx)
    .where(and(eq(flags.clinicId, clinicId), ne(flags.state, 'closed')))
    .orderBy(
      sql`array_position(array['emergency', 'urgent', 'same-day', 'routine'], ${flags.urgency})`,
      asc(flags.raisedAt),
      asc(flags.id),
    );

export const rowOf = async (tx: Tx, clinicId: string, flagId: string): Promise<RoundRow> => {
  const rows = await selectRows(tx).where(and(eq(flags.clinicId, clinicId), eq(flags.id, flagId)));
  const row = rows[0];
  if (!row) throw new Problem('not-found');
  return row;
};

/** What stands of the findings of several flags at once. */
export const findingsOfFlags = async (
  tx: Tx,
  clinicId: string,
  flagIds: readonly string[],
): Promise<Map<string, Finding[]>> => {
  const byFlag = new Map<string, Finding[]>();
  if (flagIds.length === 0) return byFlag;
  const rows = await tx
    .select()
    .from(findings)
    .where(and(eq(findings.clinicId, clinicId), inArray(findings.flagId, [...flagIds])))
    .orderBy(asc(findings.toldAt), asc(findings.id));
  for (const { flagId, code, ruleVersion, urgency, values } of rows) {
    byFlag.set(flagId, [...(byFlag.get(flagId) ?? []), { code, ruleVersion, urgency, values }]);
  }
  for (const [flagId, found] of byFlag) byFlag.set(flagId, standingFindings(found));
  return byFlag;
};

/** Pain and date of the check-ins of several patients between two dates, oldest first. */
export const painBetween = async (
  tx: Tx,
  clinicId: string,
  patientIds: readonly string[],
  from: string,
  to: string,
) => {
  if (patientIds.length === 0) return [];
  return tx
    .select({
      patientId: checkIns.patientId,
      localDate: checkIns.localDate,
      painNow: sql<number | null>`(${checkIns.answers} ->> 'painNow')::int`,
      painWorst: sql<number | null>`(${checkIns.answers} ->> 'painWorst')::int`,
      byProxy: sql<boolean>`${checkIns.authorId} <> ${patients.personId}`,
    })
    .from(checkIns)
    .innerJoin(patients, and(eq(patients.clinicId, checkIns.clinicId), eq(patients.id, checkIns.patientId)))
    .where(
      and(
        eq(checkIns.clinicId, clinicId),
        inArray(checkIns.patientId, [...patientIds]),
        gte(checkIns.localDate, from),
        lte(checkIns.localDate, to),
      ),
    )
    .orderBy(asc(checkIns.answeredAt));
};

/** Patients with a check-in on a date none of whose check-ins of that date is flagged. */
export const countQuiet = async (tx: Tx, clinicId: string, date: string): Promise<number> => {
  const { rows } = await tx.execute<{ quiet: number }>(sql`
    select count(*)::int as quiet from (
      select c.patient_id from check_ins c
      left join flags f on f.clinic_id = c.clinic_id and f.source_author_id = c.author_id
        and f.source_client_id = c.client_id
      where c.clinic_id = ${clinicId} and c.local_date = ${date}
      group by c.patient_id having count(f.id) = 0
    ) quiet`);
  return rows[0]?.quiet ?? 0;
};

/** What was answered: the finished check-in of a flag, else the newest of its alerts. */
export const answeredOf = async (tx: Tx, flag: FlagRecord) => {
  const finished = await tx
    .select({ answers: checkIns.answers, answeredAt: checkIns.answeredAt, localDate: checkIns.localDate })
    .from(checkIns)
    .where(
      and(
        eq(checkIns.clinicId, flag.clinicId),
        eq(checkIns.authorId, flag.sourceAuthorId),
        eq(checkIns.clientId, flag.sourceClientId),
      ),
    );
  if (finished[0]) return finished[0];
  const ticked = await tx
    .select({ answers: alerts.answers, answeredAt: alerts.answeredAt, localDate: alerts.localDate })
    .from(alerts)
    .where(
      and(
        eq(alerts.clinicId, flag.clinicId),
        eq(alerts.authorId, flag.sourceAuthorId),
        eq(alerts.checkInClientId, flag.sourceClientId),
      ),
    )
    .orderBy(desc(alerts.receivedAt))
    .limit(1);
  if (!ticked[0]) throw new Error('A flag without its source.');
  return ticked[0];
};

export const eventsOf = (tx: Tx, flag: FlagRecord) =>
  tx
    .select({
      id: flagEvents.id,
      kind: flagEvents.kind,
      at: flagEvents.at,
      by: people.name,
      detail: flagEvents.detail,
      note: flagEvents.note,
    })
    .from(flagEvents)
    .leftJoin(people, and(eq(people.clinicId, flagEvents.clinicId), eq(people.id, flagEvents.byPersonId)))
    .where(and(eq(flagEvents.clinicId, flag.clinicId), eq(flagEvents.flagId, flag.id)))
    .orderBy(
      asc(flagEvents.at),
      // What one action does at one instant reads in the order in which it happens.
      sql`array_position(array[${sql.join(
        flagEventKinds.map((kind) => sql`${kind}`),
        sql`, `,
      )}], ${flagEvents.kind})`,
      asc(flagEvents.id),
    );

const earlierShown = 10;

export const earlierFlagsOf = (tx: Tx, flag: FlagRecord): Promise<FlagRecord[]> =>
  tx
    .select()
    .from(flags)
    .where(and(eq(flags.clinicId, flag.clinicId), eq(flags.patientId, flag.patientId), ne(flags.id, flag.id)))
    .orderBy(desc(flags.raisedAt))
    .limit(earlierShown);

export const threadOfFlag = async (tx: Tx, flag: FlagRecord): Promise<string | null> => {
  const rows = await tx
    .select({ id: threads.id })
    .from(threads)
    .where(and(eq(threads.clinicId, flag.clinicId), eq(threads.flagId, flag.id)));
  return rows[0]?.id ?? null;
};

export const patientPersonOf = async (tx: Tx, clinicId: string, patientId: string) => {
  const rows = await tx
    .select({ personId: patients.personId, timeZone: patients.timeZone })
    .from(patients)
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  const row = rows[0];
  if (!row) throw new Error('A flag without its patient.');
  return row;
};

export const nameOf = async (tx: Tx, clinicId: string, personId: string): Promise<string> => {
  const rows = await tx
    .select({ name: people.name })
    .from(people)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  return rows[0]?.name ?? 'a colleague';
};
