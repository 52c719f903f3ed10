import { sql } from 'drizzle-orm';
import {
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { threadStates } from '#shared/threads/contract.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { flags } from './flags.ts';
import { patients } from './patients.ts';
import { people } from './people.ts';

export const threads = pgTable(
  'threads',
  {
    ...clinicRow(),
    patientId: uuid().notNull(),
    authorId: uuid().notNull(),
    clientId: uuid().notNull(),
    subject: text().notNull(),
    state: text({ enum: threadStates }).notNull(),
    /** The flag that a clinician answered with this thread. */
    flagId: uuid(),
    /** The sequence of the newest message: the thread's one order is handed out by updating this row. */
    lastSequence: integer().notNull().default(0),
    lastAt: instant().notNull(),
    createdAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique('threads_author_client_id').on(table.clinicId, table.authorId, table.clientId),
    foreignKey({
      columns: [table.clinicId, table.patientId],
      foreignColumns: [patients.clinicId, patients.id],
    }),
    foreignKey({ columns: [table.clinicId, table.authorId], foreignColumns: [people.clinicId, people.id] }),
    foreignKey({ columns: [table.clinicId, table.flagId], foreignColumns: [flags.clinicId, flags.id] }),
    uniqueIndex('threads_one_per_flag')
      .on(table.clinicId, table.flagId)
      .where(sql`flag_id is not null`),
    index().on(table.clinicId, table.patientId, table.lastAt),
  ],
);

export const messages = pgTable(
  'messages',
  {
    ...clinicRow(),
    threadId: uuid().notNull(),
    sequence: integer().notNull(),
    kind: text({ enum: ['message', 'note'] }).notNull(),
    /** Null for a note that the system wrote, as when the clinic is closed. */
    authorId: uuid(),
    authorSide: text({ enum: ['patient', 'clinic'] }),
    clientId: uuid(),
    text: text().notNull(),
    sentAt: instant().notNull(),
  },
  (table) => [
    clinicKey(table),
    unique('messages_sequence').on(table.clinicId, table.threadId, table.sequence),
    unique('messages_author_client_id').on(table.clinicId, table.authorId, table.clientId),
    foreignKey({ columns: [table.clinicId, table.threadId], foreignColumns: [threads.clinicId, threads.id] }),
    foreignKey({ columns: [table.clinicId, table.authorId], foreignColumns: [people.clinicId, people.id] }),
  ],
);

/** Who takes part in a thread and how far each has seen it. */
export const threadParticipants = pgTable(
  'thread_participants',
  {
    clinicId: uuid().notNull(),
    threadId: uuid().notNull(),
    personId: uuid().notNull(),
    side: text({ enum: ['patient', 'clinic'] }).notNull(),
    seenSequence: integer().notNull().default(0),
    seenAt: instant(),
  },
  (table) => [
    primaryKey({ columns: [table.clinicId, table.threadId, table.personId] }),
    foreignKey({ columns: [table.clinicId, table.threadId], foreignColumns: [threads.clinicId, threads.id] }),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.personId),
  ],
);
