import { sql } from 'drizzle-orm';
import { boolean, date, foreignKey, index, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { Answers } from '#shared/check-ins/answers.ts';
import { checkInKinds } from '#shared/check-ins/contract.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { patients } from './patients.ts';
import { people } from './people.ts';

/** What check-ins and alerts share: who answered what, when by both clocks, under which rules. */
const answeredColumns = () => ({
  patientId: uuid().notNull(),
  authorId: uuid().notNull(),
  /** Made by the author's device; unique for that author, and never a key of its own. */
  clientId: uuid().notNull(),
  answers: jsonb().$type<Answers>().notNull(),
  /** When it was answered, by the server's clock where the device's is doubtful. */
  answeredAt: instant().notNull(),
  /** What the device's clock said, kept where it is doubtful. */
  answeredAtDevice: text(),
  receivedAt: instant().notNull(),
  /** The patient's local date it is for. */
  localDate: date().notNull(),
  /** The device's clock and the server's disagreed by over five minutes. */
  clockDoubtful: boolean().notNull().default(false),
  rulesVersion: text().notNull(),
  /** Null until the rules have been run over it. */
  evaluatedAt: instant(),
});

/** Nothing is overwritten: a later check-in of the same day is a row of its own. */
export const checkIns = pgTable(
  'check_ins',
  { ...clinicRow(), ...answeredColumns(), kind: text({ enum: checkInKinds }).notNull() },
  (table) => [
    clinicKey(table),
    unique('check_ins_author_client_id').on(table.clinicId, table.authorId, table.clientId),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.authorId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.patientId, table.answeredAt),
    index('check_ins_unevaluated')
      .on(table.receivedAt)
      .where(sql`evaluated_at is null`),
  ],
);

/** An emergency or urgent answer sent at the tick, before its check-in is finished. */
export const alerts = pgTable(
  'alerts',
  {
    ...clinicRow(),
    ...answeredColumns(),
    /** The client-made id of the check-in being filled in, which joins this alert's flag. */
    checkInClientId: uuid().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique('alerts_author_client_id').on(table.clinicId, table.authorId, table.clientId),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.authorId], foreignColumns: [people.clinicId, people.id] }),
    index('alerts_unevaluated')
      .on(table.receivedAt)
      .where(sql`evaluated_at is null`),
  ],
);

/** "I ticked this by mistake": a record of its own. The alert and its flag stay for a human. */
export const alertMistakes = pgTable(
  'alert_mistakes',
  {
    ...clinicRow(),
    alertId: uuid().notNull(),
    authorId: uuid().notNull(),
    clientId: uuid().notNull(),
    answeredAtDevice: text().notNull(),
    receivedAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique('alert_mistakes_author_client_id').on(table.clinicId, table.authorId, table.clientId),
    foreignKey({ columns: [table.clinicId, table.alertId], foreignColumns: [alerts.clinicId, alerts.id] }),
    foreignKey({ columns: [table.clinicId, table.authorId], foreignColumns: [people.clinicId, people.id] }),
  ],
);
