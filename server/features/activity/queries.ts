import { and, asc, desc, eq, gte, inArray, isNull, lt, ne, or, sql } from 'drizzle-orm';
import { auditEntries } from '../../db/schema/audit.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { careTeamMembers, chartOpenings } from '../../db/schema/patients.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { shownActions } from './words.ts';

export type Asked = {
  clinicId: string;
  patientId: string;
  /** Left out, where the patient asks for the others alone. */
  without: string | null;
  before: Date | null;
};

const asked = ({ clinicId, patientId, without, before }: Asked) =>
  and(
    eq(auditEntries.clinicId, clinicId),
    eq(auditEntries.patientId, patientId),
    inArray(auditEntries.action, Object.keys(shownActions)),
    without === null ? undefined : or(isNull(auditEntries.personId), ne(auditEntries.personId, without)),
    before === null ? undefined : lt(auditEntries.at, before),
  );

/**
 * The newest entries, a page of them and whatever happened at the same instant as the last: the next page begins
 * before that instant and misses nothing.
 */
export const entriesOf = async (tx: Tx, of: Asked, pageSize: number) => {
  const [last] = await tx
    .select({ at: auditEntries.at })
    .from(auditEntries)
    .where(asked(of))
    .orderBy(desc(auditEntries.at))
    .offset(pageSize - 1)
    .limit(1);
  const entries = await tx
    .select({
      id: auditEntries.id,
      at: auditEntries.at,
      personId: auditEntries.personId,
      action: auditEntries.action,
      subjectId: auditEntries.subjectId,
      name: people.name,
      credential: people.credential,
    })
    .from(auditEntries)
    .leftJoin(people, and(eq(people.clinicId, auditEntries.clinicId), eq(people.id, auditEntries.personId)))
    .where(and(asked(of), last ? gte(auditEntries.at, last.at) : undefined))
    .orderBy(desc(auditEntries.at), desc(auditEntries.id));
  const more = last ? (await tx.$count(auditEntries, asked({ ...of, before: last.at }))) > 0 : false;
  return { entries, more };
};

export type Entry = Awaited<ReturnType<typeof entriesOf>>['entries'][number];

/** What the people of the entries are to the patient now. */
export const relationsOf = async (tx: Tx, clinicId: string, patientId: string) => {
  const team = await tx
    .select({ personId: careTeamMembers.personId })
    .from(careTeamMembers)
    .where(and(eq(careTeamMembers.clinicId, clinicId), eq(careTeamMembers.patientId, patientId)));
  const staff = await tx
    .selectDistinct({ personId: personRoles.personId })
    .from(personRoles)
    .where(and(eq(personRoles.clinicId, clinicId), sql`${personRoles.role} not in ('patient', 'caregiver')`));
  const cared = await tx
    .select({ personId: caregivers.personId, relationship: caregivers.relationship })
    .from(caregivers)
    .where(and(eq(caregivers.clinicId, clinicId), eq(caregivers.patientId, patientId)))
    .orderBy(asc(caregivers.createdAt));
  return {
    team: new Set(team.map(({ personId }) => personId)),
    staff: new Set(staff.map(({ personId }) => personId)),
    // The newest grant is the last to be set.
    relationships: new Map(cared.map(({ personId, relationship }) => [personId, relationship])),
  };
};

/** Why people from outside the care team opened the chart, oldest first. */
export const reasonsOf = (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({
      id: chartOpenings.id,
      personId: chartOpenings.personId,
      reason: chartOpenings.reason,
      at: chartOpenings.at,
    })
    .from(chartOpenings)
    .where(and(eq(chartOpenings.clinicId, clinicId), eq(chartOpenings.patientId, patientId)))
    .orderBy(asc(chartOpenings.at));
