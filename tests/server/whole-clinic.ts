import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/node-postgres';
import { auditEntries } from '#server/db/schema/audit.ts';
import { alertMistakes } from '#server/db/schema/check-ins.ts';
import { caregivers } from '#server/db/schema/caregivers.ts';
import {
  authenticators,
  oneTimeTokens,
  passkeys,
  pendingSignIns,
  recoveryCodes,
} from '#server/db/schema/gate.ts';
import { invitations, twoPersonActs } from '#server/db/schema/invitations.ts';
import { notifications, notificationSettings, pushSubscriptions } from '#server/db/schema/notifications.ts';
import { chartOpenings, patientStateChanges } from '#server/db/schema/patients.ts';
import { signOffs } from '#server/db/schema/plans.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { plantAlert, plantFlag, plantThread } from './records.ts';

export type WholeClinic = { clinicId: string; therapist: TestPerson; patient: TestPatient; flagId: string };

/** The tables behind the clinics' fence, but for `clinics` itself, whose key is its id. */
export const fencedTables = [
  'people',
  'person_roles',
  'patients',
  'operation_cards',
  'care_team_members',
  'plans',
  'sign_offs',
  'check_ins',
  'alerts',
  'alert_mistakes',
  'flags',
  'findings',
  'flag_events',
  'threads',
  'messages',
  'thread_participants',
  'notifications',
  'notification_settings',
  'push_subscriptions',
  'patient_state_changes',
  'chart_openings',
  'caregivers',
  'invitations',
  'two_person_acts',
  'audit_entries',
] as const;

/** A clinic with at least one row in every table behind the fence. */
export const plantWholeClinic = async (database: TestDatabase): Promise<WholeClinic> => {
  const db = drizzle({ client: database.asSuperuser, casing: 'snake_case' });
  const clinicId = await makeClinic(database);
  const therapist = await makePerson(database, clinicId, ['therapist']);
  const patient = await makePatient(database, clinicId, { lead: therapist });
  const { flagId } = await plantFlag(database, patient);
  await plantThread(database, patient);
  const alert = await plantAlert(database, patient);
  const at = new Date();
  await db.insert(alertMistakes).values({
    clinicId,
    alertId: alert.id,
    authorId: patient.personId,
    clientId: randomUUID(),
    answeredAtDevice: at.toISOString(),
    receivedAt: at,
  });
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    'select id from plans where clinic_id = $1',
    [clinicId],
  );
  await db.insert(signOffs).values({
    clinicId,
    planId: rows[0]!.id,
    kind: 'open-phase',
    code: 'motion',
    onDate: at.toISOString().slice(0, 10),
    byPersonId: therapist.personId,
  });
  await db.insert(notifications).values({
    clinicId,
    personId: therapist.personId,
    channel: 'email',
    kind: 'new-flag',
    occasion: `flag:${flagId}:same-day`,
    path: `/round/${flagId}`,
    createdAt: at,
  });
  const { personId } = therapist;
  const { patientId } = patient;
  await db.insert(notificationSettings).values({
    clinicId,
    personId,
    kind: 'new-flag',
    channel: 'email',
    enabled: false,
  });
  await db.insert(pushSubscriptions).values({
    clinicId,
    personId,
    sessionId: randomUUID(),
    endpoint: `https://push.example/${randomUUID()}`,
    p256dh: 'p256dh',
    auth: 'auth',
    deviceName: 'Chrome on Linux',
    createdAt: at,
  });
  await db.insert(patientStateChanges).values({
    clinicId,
    patientId,
    fromState: 'planned',
    toState: 'active',
    reason: 'Surgery was yesterday.',
    byPersonId: personId,
    at,
  });
  await db.insert(chartOpenings).values({ clinicId, patientId, personId, reason: 'Covering.', at });
  await db.insert(caregivers).values({
    clinicId,
    patientId,
    personId,
    calledName: 'Whole Caregiver',
    relationship: 'son',
    mayCheckIn: true,
    mayMessage: true,
    grantedBy: patient.personId,
    createdAt: at,
    endedAt: at,
    endedBy: patient.personId,
  });
  await db.insert(invitations).values({
    clinicId,
    personId: patient.personId,
    kind: 'patient',
    byEmail: false,
    createdBy: personId,
    createdAt: at,
    expiresAt: at,
  });
  await db.insert(twoPersonActs).values({
    clinicId,
    kind: 'grant-role',
    personId,
    role: 'clinical-lead',
    reason: 'Leads the protocols.',
    state: 'waiting',
    requestedBy: patient.personId,
    requestedAt: at,
  });
  await db.insert(auditEntries).values({
    clinicId,
    at,
    actorKind: 'person',
    personId: therapist.personId,
    action: 'case.opened',
    subjectId: flagId,
    patientId: patient.patientId,
  });
  return { clinicId, therapist, patient, flagId };
};

/** A row in every table of the gate that holds somebody's ways in. */
export const plantWaysIn = async (
  database: TestDatabase,
  { clinicId, personId }: { clinicId: string; personId: string },
): Promise<void> => {
  const db = drizzle({ client: database.asSuperuser, casing: 'snake_case' });
  const owner = { clinicId, personId };
  const at = new Date();
  await db.insert(passkeys).values({
    ...owner,
    credentialId: randomUUID(),
    publicKey: 'key',
    counter: 0,
    transports: ['internal'],
    backedUp: false,
    name: 'A phone',
    createdAt: at,
  });
  await db.insert(authenticators).values({ ...owner, sealedSecret: 'sealed' });
  await db.insert(recoveryCodes).values({ ...owner, codeHash: randomUUID() });
  await db.insert(pendingSignIns).values({ ...owner, expiresAt: at });
  await db.insert(oneTimeTokens).values({ ...owner, kind: 'password-reset', createdAt: at, expiresAt: at });
};
