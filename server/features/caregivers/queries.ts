import { and, desc, eq, gte, inArray, isNull, lte, min, or, sql } from 'drizzle-orm';
import { alias, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { Problem } from '#shared/problems/problems.ts';
import { auditEntries } from '../../db/schema/audit.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { patientSideActions } from '../activity/words.ts';

export type CaregiverRow = typeof caregivers.$inferSelect;

/** The one door to a grant of care: that of a patient whose record is open to the one who asks. */
export const caregiverOf = async (
  tx: Tx,
  { clinicId, patientId, caregiverId }: { clinicId: string; patientId: string; caregiverId: string },
): Promise<CaregiverRow> => {
  const rows = await tx
    .select()
    .from(caregivers)
    .where(
      and(
        eq(caregivers.clinicId, clinicId),
        eq(caregivers.patientId, patientId),
        eq(caregivers.id, caregiverId),
      ),
    );
  const row = rows[0];
  if (!row) throw new Problem('not-found');
  return row;
};

/** Everybody who cares for a patient on a date of the patient's own calendar. */
export const activeCaregiversOf = (
  tx: Tx,
  { clinicId, patientId, today }: { clinicId: string; patientId: string; today: string },
) =>
  tx
    .select({ id: caregivers.id, personId: caregivers.personId, mayMessage: caregivers.mayMessage })
    .from(caregivers)
    .where(
      and(
        eq(caregivers.clinicId, clinicId),
        eq(caregivers.patientId, patientId),
        isNull(caregivers.endedAt),
        or(isNull(caregivers.untilDate), gte(caregivers.untilDate, today)),
      ),
    );

const granter = alias(people, 'granter');

/**
 * When somebody looked at the record for the first time by a grant. A first sign-in would tell who was here before;
 * and what staff do as staff does not count, since it would tell who works here.
 */
const firstOpenedAt = (tx: Tx) =>
  tx
    .select({ at: min(auditEntries.at) })
    .from(auditEntries)
    .where(
      and(
        eq(auditEntries.clinicId, caregivers.clinicId),
        eq(auditEntries.patientId, caregivers.patientId),
        eq(auditEntries.personId, caregivers.personId),
        inArray(auditEntries.action, patientSideActions),
        gte(auditEntries.at, caregivers.createdAt),
        or(isNull(caregivers.endedAt), lte(auditEntries.at, caregivers.endedAt)),
      ),
    );

/** All grants of a patient with the names, the newest first. */
export const grantsOf = (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({
      grant: caregivers,
      name: people.name,
      email: people.email,
      firstOpenedAt: sql<Date | null>`${firstOpenedAt(tx)}`.mapWith(auditEntries.at),
      grantedBy: granter.name,
    })
    .from(caregivers)
    .innerJoin(people, and(eq(people.clinicId, caregivers.clinicId), eq(people.id, caregivers.personId)))
    .innerJoin(granter, and(eq(granter.clinicId, caregivers.clinicId), eq(granter.id, caregivers.grantedBy)))
    .where(and(eq(caregivers.clinicId, clinicId), eq(caregivers.patientId, patientId)))
    .orderBy(desc(caregivers.createdAt), desc(caregivers.id));

/** What somebody is to a patient by their newest grant; for a query that has the three ids in its row. */
export const relationshipTo = (clinicId: AnyPgColumn, patientId: AnyPgColumn, personId: AnyPgColumn) =>
  sql<string | null>`(
    select c.relationship from caregivers c
    where c.clinic_id = ${clinicId} and c.patient_id = ${patientId} and c.person_id = ${personId}
    order by c.created_at desc limit 1)`;

/** Who answered for a patient; null where it was the patient. */
export const proxyOf = async (
  tx: Tx,
  clinicId: string,
  patientId: string,
  authorId: string,
): Promise<{ name: string; relationship: string } | null> => {
  const rows = await tx
    .select({
      name: people.name,
      isPatient: sql<boolean>`${patients.personId} = ${people.id}`,
      relationship: relationshipTo(patients.clinicId, patients.id, people.id),
    })
    .from(patients)
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, authorId)))
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  const author = rows[0];
  if (!author || author.isPatient) return null;
  return { name: author.name, relationship: author.relationship ?? 'caregiver' };
};
