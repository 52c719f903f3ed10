import { sql } from 'drizzle-orm';
import { boolean, date, foreignKey, index, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { patients } from './patients.ts';
import { people } from './people.ts';

/** Who may look after a patient's record on the patient's behalf, within which limits, and until when. */
export const caregivers = pgTable(
  'caregivers',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    personId: uuid().notNull(),
    /** The name that whoever invited typed. The patient reads this one: it tells nothing of who has an account. */
    calledName: text().notNull(),
    /** As the patient says it: husband, daughter, neighbor. */
    relationship: text().notNull(),
    /** Today and the plan are always seen; these are given or not. */
    mayCheckIn: boolean().notNull(),
    mayMessage: boolean().notNull(),
    /** The last day, in the patient's zone; null for as long as nobody ends it. */
    untilDate: date(),
    grantedBy: uuid().notNull(),
    /** Where the clinic invited: how and when the patient agreed. Null where the patient invited. */
    consent: text(),
    createdAt: instant().notNull(),
    endedAt: instant(),
    endedBy: uuid(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    foreignKey({ columns: [table.clinicId, table.grantedBy], foreignColumns: [people.clinicId, people.id] }),
    foreignKey({ columns: [table.clinicId, table.endedBy], foreignColumns: [people.clinicId, people.id] }),
    uniqueIndex('caregivers_one_open')
      .on(table.clinicId, table.patientId, table.personId)
      .where(sql`ended_at is null`),
    index().on(table.clinicId, table.personId),
  ],
);
