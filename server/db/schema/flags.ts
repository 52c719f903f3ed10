import { sql } from 'drizzle-orm';
import {
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { ruleCodes, urgencies, type Finding } from '#shared/red-flags/findings.ts';
import { flagStates, outcomes } from '#shared/triage/lifecycle.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { patients } from './patients.ts';
import { people } from './people.ts';

/** One flag per check-in, whatever restarts: its source is its key. */
export const flags = pgTable(
  'flags',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    /** Who answered, and the client-made id of the check-in that was (or is being) filled in. */
    sourceAuthorId: uuid().notNull(),
    sourceClientId: uuid().notNull(),
    urgency: text({ enum: urgencies }).notNull(),
    state: text({ enum: flagStates }).notNull().default('open'),
    raisedAt: instant().notNull(),
    claimedBy: uuid(),
    claimedAt: instant(),
    closedAt: instant(),
    outcome: text({ enum: outcomes }),
    worthRaising: text({ enum: ['yes', 'no'] }),
  },
  (table) => [
    clinicKey(table),
    unique('flags_source').on(table.clinicId, table.sourceAuthorId, table.sourceClientId),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({
      columns: [table.clinicId, table.sourceAuthorId],
      foreignColumns: [people.clinicId, people.id],
    }),
    foreignKey({ columns: [table.clinicId, table.claimedBy], foreignColumns: [people.clinicId, people.id] }),
    index('flags_round')
      .on(table.clinicId, table.raisedAt)
      .where(sql`state <> 'closed'`),
    index().on(table.clinicId, table.patientId, table.raisedAt),
  ],
);

export const findings = pgTable(
  'findings',
  {
    ...clinicRow(),
    flagId: uuid().notNull(),
    /** The check-in or alert in which it was found. Nothing that was found is overwritten by what came later. */
    sourceId: uuid().notNull(),
    code: text({ enum: ruleCodes }).notNull(),
    ruleVersion: integer().notNull(),
    urgency: text({ enum: urgencies }).notNull(),
    /** The values that made the rule fire, among them the day and the person's own usual. */
    values: jsonb().$type<Finding['values']>().notNull(),
    /** When the check-in or alert was received that told it. */
    toldAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique('findings_once').on(table.clinicId, table.flagId, table.sourceId, table.code),
    foreignKey({ columns: [table.clinicId, table.flagId], foreignColumns: [flags.clinicId, flags.id] }),
  ],
);

export const flagEventKinds = [
  'raised',
  'raised-again',
  'seen',
  'claimed',
  'released',
  'replied',
  'ticked-by-mistake',
  'closed',
] as const;

export const flagEvents = pgTable(
  'flag_events',
  {
    ...clinicRow(),
    flagId: uuid().notNull(),
    kind: text({ enum: flagEventKinds }).notNull(),
    at: instant().notNull(),
    /** Null for what the system did. */
    byPersonId: uuid(),
    detail: text(),
    /** What a person wrote about it, as when closing a flag. */
    note: text(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({ columns: [table.clinicId, table.flagId], foreignColumns: [flags.clinicId, flags.id] }),
    foreignKey({ columns: [table.clinicId, table.byPersonId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.flagId, table.at),
    uniqueIndex('flag_events_raised_once')
      .on(table.clinicId, table.flagId)
      .where(sql`kind = 'raised'`),
    // Once per person and raising: the detail of a look is the raising that it saw.
    uniqueIndex('flag_events_seen_once')
      .on(table.clinicId, table.flagId, table.byPersonId, table.detail)
      .where(sql`kind = 'seen'`),
    // A repeated reply is the same event; the detail of a reply is its message.
    uniqueIndex('flag_events_replied_once')
      .on(table.clinicId, table.flagId, table.detail)
      .where(sql`kind = 'replied'`),
  ],
);
