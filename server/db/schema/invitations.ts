import { boolean, foreignKey, index, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { roles } from '#shared/access/permissions.ts';
import { invitationKinds } from '#shared/people/invitations.ts';
import { twoPersonActKinds, twoPersonActStates } from '#shared/people/two-person-acts.ts';
import { clinicKey, clinicRow, instant } from './columns.ts';
import { people } from './people.ts';

/**
 * An invitation as the clinic sees it. Its id is that of the one-time token in the gate, which alone decides
 * whether it can still be used. A new one revokes those before it.
 */
export const invitations = pgTable(
  'invitations',
  {
    ...clinicRow(),
    personId: uuid().notNull(),
    kind: text({ enum: invitationKinds }).notNull(),
    byEmail: boolean().notNull(),
    createdBy: uuid().notNull(),
    createdAt: instant().notNull(),
    expiresAt: instant().notNull(),
    acceptedAt: instant(),
    revokedAt: instant(),
    /** Whoever holds it came too late and asked for a new one. */
    askedAgainAt: instant(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    foreignKey({ columns: [table.clinicId, table.createdBy], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.personId, table.createdAt),
  ],
);

/** What one person asks for and another decides. Neither may be the person it is about. */
export const twoPersonActs = pgTable(
  'two_person_acts',
  {
    ...clinicRow(),
    kind: text({ enum: twoPersonActKinds }).notNull(),
    personId: uuid().notNull(),
    /** For a role: which. */
    role: text({ enum: roles }),
    reason: text().notNull(),
    state: text({ enum: twoPersonActStates }).notNull(),
    requestedBy: uuid().notNull(),
    requestedAt: instant().notNull(),
    decidedBy: uuid(),
    decidedAt: instant(),
  },
  (table) => [
    clinicKey(table),
    foreignKey({ columns: [table.clinicId, table.personId], foreignColumns: [people.clinicId, people.id] }),
    foreignKey({
      columns: [table.clinicId, table.requestedBy],
      foreignColumns: [people.clinicId, people.id],
    }),
    foreignKey({ columns: [table.clinicId, table.decidedBy], foreignColumns: [people.clinicId, people.id] }),
    index().on(table.clinicId, table.state),
  ],
);
