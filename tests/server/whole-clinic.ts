import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/node-postgres';
import { auditEntries } from '#server/db/schema/audit.ts';
import { alertMistakes } from '#server/db/schema/check-ins.ts';
import { notifications } from '#server/db/schema/notifications.ts';
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
