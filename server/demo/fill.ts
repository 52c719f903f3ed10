import { localDateIn } from '#shared/plans/calendar.ts';
import { alerts, checkIns } from '../db/schema/check-ins.ts';
import { clinics } from '../db/schema/clinics.ts';
import { findings, flagEvents, flags } from '../db/schema/flags.ts';
import { credentials } from '../db/schema/gate.ts';
import { careTeamMembers, operationCards, patients } from '../db/schema/patients.ts';
import { people, personRoles } from '../db/schema/people.ts';
import { plans, signOffs } from '../db/schema/plans.ts';
import { messages, threadParticipants, threads } from '../db/schema/threads.ts';
import type { Tx } from '../db/with-tx.ts';
import { demoCredentials } from './accounts.ts';
import { keepOutOfTheFuture } from './anchor.ts';
import { demoClinic, demoClinicId, demoTimeZone } from './clinic.ts';
import { conversationsOn } from './conversations.ts';
import { flagOf } from './flags.ts';
import { historyOf } from './histories.ts';
import { clock, instantAt, workingDayBefore } from './moments.ts';
import { patientsOfDemo } from './patients.ts';
import { recordOf } from './records.ts';
import { scenarioOn } from './scenario.ts';
import { staff, staffId } from './staff.ts';

/** So many rows go into one statement, well below PostgreSQL's 65,535 parameters. */
const batchSize = 500;

const inBatches = async <Row>(rows: readonly Row[], insert: (batch: Row[]) => Promise<unknown>) => {
  for (let from = 0; from < rows.length; from += batchSize) await insert(rows.slice(from, from + batchSize));
};

const notNull = <T>(value: T | null): value is T => value !== null;

/** Everybody's rows as they stand on a day, without a database: the same day gives the same rows. */
const rowsOn = (today: string) => {
  const scenario = scenarioOn(today);
  const told = patientsOfDemo.map((patient) => {
    const record = recordOf(patient, today);
    const history = historyOf(record, scenario[patient.name] ?? {}, today);
    return { record, history, flags: history.map((checkIn) => flagOf(record, checkIn)).filter(notNull) };
  });
  const everyFlag = told.flatMap((one) => one.flags);
  const history = told.flatMap((one) => one.history);
  const hiredAt = instantAt(workingDayBefore(today, 300), clock('9:00'));
  return {
    records: told.map(({ record }) => record),
    people: [
      ...staff.map(({ key, name, credential, email }) => ({
        clinicId: demoClinicId,
        id: staffId(key),
        name,
        credential,
        email,
        createdAt: hiredAt,
      })),
      ...told.map(({ record }) => record.person),
    ],
    roles: [
      ...staff.flatMap(({ key, roles }) =>
        roles.map((role) => ({ clinicId: demoClinicId, personId: staffId(key), role })),
      ),
      ...told.map(({ record }) => ({
        clinicId: demoClinicId,
        personId: record.person.id,
        role: 'patient' as const,
      })),
    ],
    checkIns: history.map(({ row }) => row),
    alerts: history.map(({ alert }) => alert).filter(notNull),
    flags: everyFlag,
    threads: [...conversationsOn(today), ...everyFlag.map(({ thread }) => thread).filter(notNull)],
  };
};

/** Fills the demo clinic, which must not be there, with its people and their histories up to now. */
export const fillDemo = async (tx: Tx, now: Date): Promise<void> => {
  // Hashing runs beside the telling of histories.
  const waysIn = demoCredentials();
  const rows = rowsOn(localDateIn(demoTimeZone, now));
  await tx.insert(clinics).values(demoClinic);
  await tx.insert(people).values(rows.people);
  await tx.insert(personRoles).values(rows.roles);
  await tx.insert(credentials).values(await waysIn);
  await tx.insert(patients).values(rows.records.map(({ chart }) => chart.patient));
  await tx.insert(operationCards).values(rows.records.map(({ chart }) => chart.card));
  await tx.insert(careTeamMembers).values(rows.records.flatMap(({ team }) => team));
  await tx.insert(plans).values(rows.records.map(({ plan }) => plan));
  await inBatches(
    rows.records.flatMap((record) => record.signOffs),
    (batch) => tx.insert(signOffs).values(batch),
  );
  await inBatches(rows.checkIns, (batch) => tx.insert(checkIns).values(batch));
  await tx.insert(alerts).values(rows.alerts);
  await inBatches(
    rows.flags.map(({ flag }) => flag),
    (batch) => tx.insert(flags).values(batch),
  );
  await inBatches(
    rows.flags.flatMap((flag) => flag.findings),
    (batch) => tx.insert(findings).values(batch),
  );
  await inBatches(
    rows.flags.flatMap(({ events }) => events),
    (batch) => tx.insert(flagEvents).values(batch),
  );
  await inBatches(
    rows.threads.map(({ thread }) => thread),
    (batch) => tx.insert(threads).values(batch),
  );
  await inBatches(
    rows.threads.flatMap((thread) => thread.messages),
    (batch) => tx.insert(messages).values(batch),
  );
  await inBatches(
    rows.threads.flatMap(({ participants }) => participants),
    (batch) => tx.insert(threadParticipants).values(batch),
  );
  await keepOutOfTheFuture(tx, now);
};
