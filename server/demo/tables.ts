import type { PgColumn, PgTable } from 'drizzle-orm/pg-core';
import { auditEntries } from '../db/schema/audit.ts';
import { alertMistakes, alerts, checkIns } from '../db/schema/check-ins.ts';
import { findings, flagEvents, flags } from '../db/schema/flags.ts';
import { caregivers } from '../db/schema/caregivers.ts';
import { invitations, twoPersonActs } from '../db/schema/invitations.ts';
import { notifications, notificationSettings, pushSubscriptions } from '../db/schema/notifications.ts';
import {
  careTeamMembers,
  chartOpenings,
  operationCards,
  patients,
  patientStateChanges,
} from '../db/schema/patients.ts';
import { people, personRoles } from '../db/schema/people.ts';
import { plans, signOffs } from '../db/schema/plans.ts';
import { messages, threadParticipants, threads } from '../db/schema/threads.ts';

/** A table whose rows belong to a clinic. */
export type ClinicTable = PgTable & { clinicId: PgColumn };

/**
 * Every table inside the clinics' fence but the clinics themselves, parents before their children: filled in
 * this order, emptied in the other. A test holds the list to the database.
 */
export const clinicTables: readonly ClinicTable[] = [
  people,
  personRoles,
  patients,
  operationCards,
  careTeamMembers,
  plans,
  signOffs,
  checkIns,
  alerts,
  alertMistakes,
  flags,
  findings,
  flagEvents,
  threads,
  messages,
  threadParticipants,
  notifications,
  notificationSettings,
  pushSubscriptions,
  patientStateChanges,
  chartOpenings,
  caregivers,
  invitations,
  twoPersonActs,
  auditEntries,
];
