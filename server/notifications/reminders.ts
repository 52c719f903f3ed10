import { and, eq, gt, inArray, sql } from 'drizzle-orm';
import type { Logger } from 'pino';
import type pg from 'pg';
import { consequences, stateOn } from '#shared/patients/states.ts';
import { localDateIn, type LocalDate } from '#shared/plans/calendar.ts';
import { checkIns } from '../db/schema/check-ins.ts';
import { clinics } from '../db/schema/clinics.ts';
import { notifications } from '../db/schema/notifications.ts';
import { operationCards, patients } from '../db/schema/patients.ts';
import { people } from '../db/schema/people.ts';
import { withTx, type Tx } from '../db/with-tx.ts';
import { wallTime } from './quiet-hours.ts';
import { ofClinicOfPerson, zoneOfPerson } from './recipients.ts';
import { notify } from './service.ts';

const kind = 'check-in-reminder';
const remindAtByDefault = '10:00';
/** Nobody is reminded later in the day than this, unless they asked for it. */
const remindBefore = '20:00';

const occasionOf = (date: LocalDate): string => `reminder:${date}`;

/** Patients with an account, and what decides whether they are reminded. */
const candidates = (tx: Tx) =>
  tx
    .select({
      personId: people.id,
      state: patients.state,
      surgeryDate: operationCards.surgeryDate,
      remindAt: people.remindAt,
      /** Days are counted as the check-ins are, hours where the person is. */
      recordZone: patients.timeZone,
      hoursZone: zoneOfPerson,
      lastDaily: sql<string | null>`(
        select max(${checkIns.localDate})::text from ${checkIns}
        where ${checkIns.clinicId} = ${patients.clinicId} and ${checkIns.patientId} = ${patients.id}
          and ${checkIns.kind} = 'daily')`,
    })
    .from(patients)
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .innerJoin(clinics, ofClinicOfPerson)
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    );

type Candidate = Awaited<ReturnType<typeof candidates>>[number];

/** Their check-in of that date is asked for by the clinic, and has not come yet. */
const isMissing = ({ state, surgeryDate, lastDaily }: Candidate, date: LocalDate): boolean =>
  consequences[stateOn(state, surgeryDate, date)].reminders && (lastDaily === null || lastDaily < date);

const isTime = ({ remindAt, hoursZone }: Candidate, now: Date): boolean => {
  const from = remindAt ?? remindAtByDefault;
  const time = wallTime(hoursZone, now);
  return time >= from && (time < remindBefore || from >= remindBefore);
};

/** Reminds whoever of the clinic is due to be reminded: once a local date, however often this is asked. */
const remindOfCheckIns = async (tx: Tx, clinicId: string, now: Date): Promise<void> => {
  const due = (
    await candidates(tx).where(
      and(
        eq(patients.clinicId, clinicId),
        eq(people.active, true),
        inArray(patients.state, ['planned', 'active']),
      ),
    )
  )
    .map((candidate) => ({ ...candidate, date: localDateIn(candidate.recordZone, now) }))
    .filter((candidate) => isMissing(candidate, candidate.date) && isTime(candidate, now));
  if (due.length === 0) return;
  const told = await tx
    .select({ personId: notifications.personId, occasion: notifications.occasion })
    .from(notifications)
    .where(
      and(
        eq(notifications.clinicId, clinicId),
        eq(notifications.kind, kind),
        gt(notifications.createdAt, new Date(now.getTime() - 36 * 60 * 60_000)),
      ),
    );
  const isTold = new Set(told.map(({ personId, occasion }) => `${personId} ${occasion}`));
  const left = due.filter(({ personId, date }) => !isTold.has(`${personId} ${occasionOf(date)}`));
  for (const date of new Set(left.map((one) => one.date))) {
    const ids = left.filter((one) => one.date === date).map(({ personId }) => personId);
    await notify(tx, clinicId, ids, { kind, occasion: occasionOf(date), path: '/check-in' }, now);
  }
};

/** At the moment of sending: it is still that day, the check-in has not come, and the clinic still asks for it. */
export const stillReminds = async (
  tx: Tx,
  { clinicId, personId, occasion }: { clinicId: string; personId: string; occasion: string },
  now: Date,
): Promise<boolean> => {
  const rows = await candidates(tx).where(and(eq(patients.clinicId, clinicId), eq(people.id, personId)));
  const candidate = rows[0];
  if (!candidate) return false;
  const date = localDateIn(candidate.recordZone, now);
  return occasion === occasionOf(date) && isMissing(candidate, date);
};

/** One round over every clinic. One that fails does not keep the others from being reminded. */
export const remindEverywhere = async (app: pg.Pool, now: Date, log: Logger): Promise<void> => {
  const { rows } = await withTx(app, { kind: 'anonymous' }, (tx) =>
    tx.execute<{ clinic_id: string }>(sql`select clinic_id from all_clinic_ids()`),
  );
  for (const { clinic_id: clinicId } of rows) {
    try {
      await withTx(app, { kind: 'system', clinicId }, (tx) => remindOfCheckIns(tx, clinicId, now));
    } catch (error) {
      log.error({ err: error, clinicId }, 'a clinic’s reminders could not be written');
    }
  }
};
