import {
  boolean,
  date,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { consentWays } from '#shared/patients/record.ts';
import { patientStates } from '#shared/patients/states.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { people } from './people.ts';

/** A patient's record: who they are and the safety facts that stand at the head of every case. */
export const patients = pgTable(
  'patients',
  {
    ...clinicRow(),
    personId: uuid().notNull(),
    state: text({ enum: patientStates }).notNull().default('active'),
    chartNumber: text().notNull(),
    birthDate: date().notNull(),
    phone: text().notNull(),
    address: text().notNull(),
    /** Day boundaries of check-ins and of the plan follow the patient's own zone. */
    timeZone: text().notNull(),
    language: text().notNull().default('English'),
    dominantHand: text({ enum: ['left', 'right'] }).notNull(),
    emergencyContact: text().notNull(),
    /** Its name; 'none' when asked and none is taken; null where nobody has recorded it. */
    bloodThinner: text(),
    allergies: text(),
    mainMedicines: text(),
    equipmentAtHome: text(),
    /** That the patient agreed to be looked after this way: when, how it was given, and who recorded it. */
    consentOn: date(),
    consentHow: text({ enum: consentWays }),
    consentBy: uuid(),
    createdAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique().on(table.clinicId, table.personId),
    unique().on(table.clinicId, table.chartNumber),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
  ],
);

export const operationCards = pgTable(
  'operation_cards',
  {
    clinicId: uuid().notNull(),
    patientId: uuid().notNull(),
    procedure: text({
      enum: [
        'reverse-replacement',
        'anatomic-replacement',
        'cuff-repair',
        'fracture-fixation',
        'fracture-replacement',
      ],
    }).notNull(),
    arm: text({ enum: ['left', 'right'] }).notNull(),
    surgeryDate: date().notNull(),
    surgeon: text().notNull(),
    approach: text({ enum: ['deltopectoral', 'deltoid-split'] }).notNull(),
    subscapularis: text({ enum: ['repaired', 'not-repaired', 'osteotomy'] }).notNull(),
    biceps: text({ enum: ['left', 'tenodesis'] }).notNull(),
    tuberosity: text(),
    limits: text(),
    block: text({ enum: ['none', 'single', 'long-acting'] }).notNull(),
    /** The dressing stays on until this day after surgery. */
    dressingUntilDay: integer().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.clinicId, table.patientId] }),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
  ],
);

export const careTeamMembers = pgTable(
  'care_team_members',
  {
    clinicId: uuid().notNull(),
    patientId: uuid().notNull(),
    personId: uuid().notNull(),
    /** The therapist whose name the patient sees. */
    isLead: boolean().notNull().default(false),
  },
  (table) => [
    primaryKey({ columns: [table.clinicId, table.patientId, table.personId] }),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.personId),
  ],
);

/** Every change of a patient's state, with its reason; the newest one says since when and until when. */
export const patientStateChanges = pgTable(
  'patient_state_changes',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    fromState: text({ enum: patientStates }).notNull(),
    toState: text({ enum: patientStates }).notNull(),
    reason: text().notNull(),
    /** For a pause: the day on which the patient is expected back. */
    backOn: date(),
    byPersonId: uuid().notNull(),
    at: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.byPersonId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.patientId, table.at),
  ],
);

/** Why a clinician from outside the care team opened a chart. The patient reads it. */
export const chartOpenings = pgTable(
  'chart_openings',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    personId: uuid().notNull(),
    reason: text().notNull(),
    at: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.patientId, table.personId, table.at),
  ],
);
