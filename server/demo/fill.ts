import { localDateIn } from '#shared/plans/calendar.ts';
import { alerts, checkIns } from '../db/schema/check-ins.ts';
import { clinics } from '../db/schema/clinics.ts';
import { findings, flagEvents, flags } from '../db/schema/flags.ts';
import { caregivers } from '../db/schema/caregivers.ts';
import { authenticators, credentials, oneTimeTokens } from '../db/schema/gate.ts';
import { invitations, twoPersonActs } from '../db/schema/invitations.ts';
import { notifications } from '../db/schema/notifications.ts';
import {
  careTeamMembers,
  chartOpenings,
  operationCards,
  patients,
  patientStateChanges,
} from '../db/schema/patients.ts';
import { people, personRoles } from '../db/schema/people.ts';
import { plans, signOffs } from '../db/schema/plans.ts';
import { messages, threadParticipants, threads } from '../db/schema/threads.ts';
import type { Tx } from '../db/with-tx.ts';
import { demoAuthenticators, demoCredentials } from './accounts.ts';
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
import {
  caregiversOn,
  chartOpeningsOn,
  invitationOf,
  returnedMailOn,
  stateChangesOn,
  twoPersonActsOn,
} from './standing.ts';

/** The server's own keys, for what the demo signs and seals. */
export type DemoKeys = { tokenSecret: string; sealSecret: string };

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
  const stateChanges = stateChangesOn(today);
  const stateOf = (patientId: string) =>
    stateChanges.find((change) => change.patientId === patientId)?.toState;
  // After surgery and nothing heard of them: they never came.
  const neverCame = told.filter((one) => one.history.length === 0 && one.record.patient.day > 0);
  const isDischarged = (patientId: string) => stateOf(patientId) === 'discharged';
  const hiredAt = instantAt(workingDayBefore(today, 300), clock('9:00'));
  return {
    records: told.map(({ record }) => record),
    people: [
      ...staff.map(({ key, name, credential, email, phone }) => ({
        clinicId: demoClinicId,
        id: staffId(key),
        name,
        credential,
        email,
        phone,
        firstSignedInAt: hiredAt,
        createdAt: hiredAt,
      })),
      ...told.map((one) =>
        neverCame.includes(one)
          ? { ...one.record.person, firstSignedInAt: null, emailBouncedAt: one.record.person.createdAt }
          : one.record.person,
      ),
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
    threads: [...conversationsOn(today), ...everyFlag.map(({ thread }) => thread).filter(notNull)].map(
      (one) =>
        isDischarged(one.thread.patientId)
          ? { ...one, thread: { ...one.thread, state: 'closed' as const } }
          : one,
    ),
    hiredAt,
    stateOf,
    stateChanges,
    neverCame: neverCame.map(({ record }) => record.patient.name),
  };
};

/** Fills the demo clinic, which must not be there, with its people and their histories up to now. */
export const fillDemo = async (tx: Tx, now: Date, keys: DemoKeys): Promise<void> => {
  // Hashing runs beside the telling of histories.
  const waysIn = demoCredentials();
  const today = localDateIn(demoTimeZone, now);
  const rows = rowsOn(today);
  await tx.insert(clinics).values(demoClinic);
  await tx.insert(people).values(rows.people);
  await tx.insert(personRoles).values(rows.roles);
  await tx.insert(credentials).values(await waysIn);
  await tx.insert(authenticators).values(demoAuthenticators(keys.sealSecret, rows.hiredAt));
  await tx.insert(patients).values(
    rows.records.map(({ chart: { patient }, surgeryDate }) => ({
      ...patient,
      state: rows.stateOf(patient.id) ?? (surgeryDate > today ? 'planned' : 'active'),
    })),
  );
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
  await tx.insert(patientStateChanges).values(rows.stateChanges);
  await tx.insert(caregivers).values(caregiversOn(today));
  await tx.insert(twoPersonActs).values(twoPersonActsOn(today));
  await tx.insert(chartOpenings).values(chartOpeningsOn(today));
  const invitedAt = instantAt(workingDayBefore(today, 1), clock('10:30'));
  for (const name of rows.neverCame) {
    const { row, token } = invitationOf(name, invitedAt, keys.tokenSecret);
    await tx.insert(invitations).values(row);
    await tx.insert(oneTimeTokens).values(token);
    await tx.insert(notifications).values(returnedMailOn(name, today));
  }
  await keepOutOfTheFuture(tx, now);
};
