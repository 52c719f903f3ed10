import { date, foreignKey, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { PlanContent } from '#shared/plans/plan.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { patients } from './patients.ts';
import { people } from './people.ts';

/** A recovery plan: one protocol version bound to one patient, its content kept as it was given. */
export const plans = pgTable(
  'plans',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    protocolCode: text().notNull(),
    protocolVersion: integer().notNull(),
    content: jsonb().$type<PlanContent>().notNull(),
    createdAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique().on(table.clinicId, table.patientId),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
  ],
);

/** What a clinician decided about a plan, and when: nothing in a plan moves without one. */
export const signOffs = pgTable(
  'sign_offs',
  {
    ...clinicRow(),
    planId: uuid().notNull(),
    kind: text({ enum: ['open-phase', 'lift-precaution'] }).notNull(),
    /** The phase's or precaution's code. */
    code: text().notNull(),
    onDate: date().notNull(),
    byPersonId: uuid().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique().on(table.clinicId, table.planId, table.kind, table.code),
    foreignKey({ columns: [table.clinicId, table.planId], foreignColumns: [plans.clinicId, plans.id] }),
    foreignKey({ columns: [table.clinicId, table.byPersonId], foreignColumns: [people.clinicId, people.id] }),
  ],
);
