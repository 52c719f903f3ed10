import { addDays, type LocalDate } from '#shared/plans/calendar.ts';
import { invitationLifeMs } from '#shared/people/invitations.ts';
import type { PatientState } from '#shared/patients/states.ts';
import type { caregivers } from '../db/schema/caregivers.ts';
import type { oneTimeTokens } from '../db/schema/gate.ts';
import type { invitations, twoPersonActs } from '../db/schema/invitations.ts';
import type { notifications } from '../db/schema/notifications.ts';
import type { chartOpenings, patientStateChanges } from '../db/schema/patients.ts';
import { codeHashOf, shortCodeOf } from '../features/accounts/one-time-tokens.ts';
import { demoClinicId } from './clinic.ts';
import { clock, instantAt, secondsAfter, workingDayBefore } from './moments.ts';
import { patientIdOf, personIdOf } from './patients.ts';
import { idOf } from './random.ts';
import { staffId, type StaffKey } from './staff.ts';

type StateChange = typeof patientStateChanges.$inferInsert & { toState: PatientState };

/** Patients of whom something else than "active" is told, and since when. */
export const stateChangesOn = (today: LocalDate): StateChange[] => {
  const change = (
    name: string,
    by: StaffKey,
    daysAgo: number,
    toState: PatientState,
    reason: string,
    backOn: LocalDate | null = null,
  ): StateChange => ({
    clinicId: demoClinicId,
    id: idOf('state-change', name, toState),
    patientId: patientIdOf(name),
    fromState: 'active',
    toState,
    reason,
    backOn,
    byPersonId: staffId(by),
    at: instantAt(addDays(today, -daysAgo), clock('11:20')),
  });
  return [
    change(
      'Ignatius Papadimitriou',
      'noor',
      5,
      'paused',
      'Away with his family, comes back to us after it.',
      addDays(today, 9),
    ),
    change('Desmond Achterberg', 'callum', 2, 'discharged', 'Goals reached, last visit done.'),
  ];
};

/** Teo helps his wife with everything, and a neighbor with her check-ins. */
export const caregiversOn = (today: LocalDate): (typeof caregivers.$inferInsert)[] => {
  const grant = (patient: string, relationship: string, daysAgo: number, mayMessage: boolean) => ({
    clinicId: demoClinicId,
    id: idOf('caregiver', patient, 'teo'),
    patientId: patientIdOf(patient),
    personId: staffId('teo'),
    calledName: 'Teo Valcourt',
    relationship,
    mayCheckIn: true,
    mayMessage,
    grantedBy: personIdOf(patient),
    createdAt: instantAt(addDays(today, -daysAgo), clock('17:40')),
  });
  return [
    grant('Ines Valcourt', 'husband', 23, true),
    {
      ...grant('Ruth Abramowicz', 'neighbor', 8, false),
      untilDate: addDays(today, 40),
      grantedBy: staffId('noor'),
      consent: 'She asked for it on the telephone and confirmed it at her visit.',
    },
  ];
};

/** What waits for a second person: Noor can decide it. */
export const twoPersonActsOn = (today: LocalDate): (typeof twoPersonActs.$inferInsert)[] => [
  {
    clinicId: demoClinicId,
    id: idOf('two-person-act', 'callum', 'clinical-lead'),
    kind: 'grant-role',
    personId: staffId('callum'),
    role: 'clinical-lead',
    reason: 'Takes over the protocols for cuff repair.',
    state: 'waiting',
    requestedBy: staffId('joss'),
    requestedAt: instantAt(workingDayBefore(today, 1), clock('15:05')),
  },
];

/** Why somebody from outside her care team looked at Ines's chart. */
export const chartOpeningsOn = (today: LocalDate): (typeof chartOpenings.$inferInsert)[] => [
  {
    clinicId: demoClinicId,
    id: idOf('chart-opening', 'Ines Valcourt', 'callum'),
    patientId: patientIdOf('Ines Valcourt'),
    personId: staffId('callum'),
    reason: 'Covered for Noor Haddad while she was at a course.',
    at: instantAt(workingDayBefore(today, 6), clock('14:02')),
  },
];

type Invited = {
  row: typeof invitations.$inferInsert;
  token: typeof oneTimeTokens.$inferInsert;
};

/**
 * An invitation that nobody has used. It is made on the day that the demo is filled, so that it can be tried out
 * for two weeks; one of the clinic's is two weeks old already.
 */
export const invitationOf = (name: string, at: Date, tokenSecret: string): Invited => {
  const id = idOf('invitation', name);
  const about = {
    clinicId: demoClinicId,
    id,
    personId: personIdOf(name),
    createdAt: at,
    expiresAt: new Date(at.getTime() + invitationLifeMs.patient),
  };
  return {
    row: { ...about, kind: 'patient', byEmail: true, createdBy: staffId('joss') },
    token: { ...about, kind: 'invitation', codeHash: codeHashOf(tokenSecret, shortCodeOf(tokenSecret, id)) },
  };
};

/** A mail that came back, for the administrator to see. */
export const returnedMailOn = (name: string, today: LocalDate): typeof notifications.$inferInsert => {
  const at = instantAt(workingDayBefore(today, 2), clock('9:12'));
  return {
    clinicId: demoClinicId,
    id: idOf('notification', name, 'invitation'),
    personId: personIdOf(name),
    channel: 'email',
    kind: 'invitation',
    occasion: `invitation:${idOf('invitation', name)}`,
    path: `/invitation#${idOf('invitation', name)}`,
    state: 'bounced',
    attempts: 1,
    lastError: 'bounced',
    outcome: 'came-back',
    createdAt: at,
    dueAt: at,
    sentAt: secondsAfter(at, 2),
  };
};
