import { and, asc, desc, eq, inArray, ne, sql } from 'drizzle-orm';
import { clinicianRoles } from '#shared/access/permissions.ts';
import type { PersonActor } from '../../db/actor.ts';
import { flags } from '../../db/schema/flags.ts';
import { careTeamMembers, operationCards, patients, patientStateChanges } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { isMine } from './door.ts';

const newestChange = (column: 'at' | 'back_on') => sql<string | null>`(
  select c.${sql.raw(column)}::text from patient_state_changes c
  where c.clinic_id = ${patients.clinicId} and c.patient_id = ${patients.id}
  order by c.at desc, c.id desc limit 1)`;

const selectLines = (tx: Tx, actor: PersonActor) =>
  tx
    .select({
      id: patients.id,
      personId: patients.personId,
      name: people.name,
      email: people.email,
      chartNumber: patients.chartNumber,
      state: patients.state,
      timeZone: patients.timeZone,
      surgeryDate: operationCards.surgeryDate,
      stateSince: newestChange('at'),
      backOn: newestChange('back_on'),
      leadName: sql<string | null>`(
        select lead.name from care_team_members t
        join people lead on lead.clinic_id = t.clinic_id and lead.id = t.person_id
        where t.clinic_id = ${patients.clinicId} and t.patient_id = ${patients.id} and t.is_lead limit 1)`,
      mine: isMine(actor),
      firstSignedInAt: people.firstSignedInAt,
      firstCheckInAt: sql<string | null>`(
        select min(c.received_at)::text from check_ins c
        where c.clinic_id = ${patients.clinicId} and c.patient_id = ${patients.id})`,
      emailBouncedAt: people.emailBouncedAt,
    })
    .from(patients)
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    );

export type LineRow = Awaited<ReturnType<typeof selectLines>>[number];

/** Every patient of the clinic by name. */
export const linesOf = (tx: Tx, actor: PersonActor): Promise<LineRow[]> =>
  selectLines(tx, actor)
    .where(eq(patients.clinicId, actor.clinicId))
    .orderBy(sql`${people.name} collate "en-x-icu"`, asc(patients.id));

export const lineOf = async (tx: Tx, actor: PersonActor, patientId: string): Promise<LineRow> => {
  const rows = await selectLines(tx, actor).where(
    and(eq(patients.clinicId, actor.clinicId), eq(patients.id, patientId)),
  );
  const row = rows[0];
  if (!row) throw new Error('A patient without operation card.');
  return row;
};

/** The clinic's active clinicians by name. */
export const cliniciansOf = (tx: Tx, clinicId: string) =>
  tx
    .select({ personId: people.id, name: people.name, credential: people.credential, email: people.email })
    .from(people)
    .where(
      and(
        eq(people.clinicId, clinicId),
        eq(people.active, true),
        inArray(
          people.id,
          tx
            .select({ id: personRoles.personId })
            .from(personRoles)
            .where(and(eq(personRoles.clinicId, clinicId), inArray(personRoles.role, [...clinicianRoles]))),
        ),
      ),
    )
    .orderBy(sql`${people.name} collate "en-x-icu"`, asc(people.id));

export const teamOf = (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({
      personId: careTeamMembers.personId,
      name: people.name,
      credential: people.credential,
      isLead: careTeamMembers.isLead,
    })
    .from(careTeamMembers)
    .innerJoin(
      people,
      and(eq(people.clinicId, careTeamMembers.clinicId), eq(people.id, careTeamMembers.personId)),
    )
    .where(and(eq(careTeamMembers.clinicId, clinicId), eq(careTeamMembers.patientId, patientId)))
    .orderBy(desc(careTeamMembers.isLead), sql`${people.name} collate "en-x-icu"`);

export const changesOf = (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({
      from: patientStateChanges.fromState,
      to: patientStateChanges.toState,
      reason: patientStateChanges.reason,
      backOn: patientStateChanges.backOn,
      by: people.name,
      at: patientStateChanges.at,
    })
    .from(patientStateChanges)
    .innerJoin(
      people,
      and(eq(people.clinicId, patientStateChanges.clinicId), eq(people.id, patientStateChanges.byPersonId)),
    )
    .where(and(eq(patientStateChanges.clinicId, clinicId), eq(patientStateChanges.patientId, patientId)))
    .orderBy(desc(patientStateChanges.at), desc(patientStateChanges.id));

export const countOpenFlags = (tx: Tx, clinicId: string, patientId: string): Promise<number> =>
  tx.$count(
    flags,
    and(eq(flags.clinicId, clinicId), eq(flags.patientId, patientId), ne(flags.state, 'closed')),
  );
