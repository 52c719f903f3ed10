import { isDeepStrictEqual } from 'node:util';
import { and, eq } from 'drizzle-orm';
import type { EnrolPatient, PatientRecord } from '#shared/patients/contract.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { reverseReplacement } from '#shared/plans/reverse-replacement.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { careTeamMembers, operationCards, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import { plans } from '../../db/schema/plans.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { writeAudit } from '../audit/service.ts';
import { invitePerson } from '../people/inviting.ts';
import { addPerson, personIdFor, readPhone } from '../people/new-person.ts';
import { holdTurn } from '../people/turns.ts';
import { chartOf } from '../plans/queries.ts';
import {
  asKept,
  consentErrors,
  recordErrors,
  refuseAny,
  surroundingsOf,
  type KeptRecord,
} from './checking.ts';
import { lineOf, teamOf } from './queries.ts';
import { recordOf } from './record.ts';
import { storedFields } from './stored.ts';

/** Until a patient says otherwise: no sound at night, and a reminder in the morning, in their own time zone. */
const startingHours = { quietFrom: '21:00', quietUntil: '08:00', remindAt: '10:00' } as const;

type NewPatient = KeptRecord & {
  id: string;
  country: string;
  consent: EnrolPatient['consent'];
  invite: EnrolPatient['invite'];
};

/** Writes everything that a patient begins with. What was given has been checked, and the clinic's people are locked. */
export const writePatient = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { id, identity, operation, careTeam, consent, invite, country }: NewPatient,
  now: Date,
): Promise<void> => {
  const { clinicId } = actor;
  const personId = personIdFor(clinicId, id);
  const { name, email, ...facts } = identity;
  await addPerson(
    tx,
    actor,
    {
      id: personId,
      name,
      email,
      roles: ['patient'],
      phone: readPhone(identity.phone, country),
      timeZone: identity.timeZone,
    },
    now,
  );
  await tx
    .update(people)
    .set(startingHours)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  const isPlanned = localDateIn(identity.timeZone, now) < operation.surgeryDate;
  await tx.insert(patients).values({
    clinicId,
    id,
    personId,
    ...facts,
    state: isPlanned ? 'planned' : 'active',
    consentOn: consent.on,
    consentHow: consent.how,
    consentBy: actor.personId,
    createdAt: now,
  });
  await tx.insert(operationCards).values({ clinicId, patientId: id, ...operation });
  await tx.insert(careTeamMembers).values(careTeam.map((member) => ({ clinicId, patientId: id, ...member })));
  // The one plan there is, whatever the procedure: protocols of the others come with their own work.
  await tx.insert(plans).values({
    clinicId,
    patientId: id,
    protocolCode: reverseReplacement.code,
    protocolVersion: reverseReplacement.version,
    content: reverseReplacement,
    createdAt: now,
  });
  if (invite !== 'not-yet') {
    await invitePerson(tx, site, actor, { personId, kind: 'patient', byEmail: invite === 'email' }, now);
  }
  await writeAudit(
    tx,
    actor,
    { action: 'patient.enrolled', subjectId: id, patientId: id, detail: { invite } },
    now,
  );
};

/** Whether what stands under an id is what was sent under it. */
const isEnrolled = async (
  tx: Tx,
  actor: PersonActor,
  patientId: string,
  given: KeptRecord & { consent: EnrolPatient['consent'] },
): Promise<boolean> => {
  const chart = await chartOf(tx, actor.clinicId, patientId);
  const { email } = await lineOf(tx, actor, patientId);
  const team = await teamOf(tx, actor.clinicId, patientId);
  const stands = {
    ...storedFields(chart, email, team),
    consent: { on: chart.patient.consentOn, how: chart.patient.consentHow },
  };
  return isDeepStrictEqual(stands, given);
};

/** Enrols a patient, all of it or nothing. A repeat with the same content is the same success. */
export const enrol = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { id, invite, consent, ...fields }: EnrolPatient,
  now: Date,
): Promise<PatientRecord> => {
  const { clinicId } = actor;
  // Everybody enrols one after another, so that what is free when it is looked at stays free.
  await holdTurn(tx, clinicId, 'address-is-taken');
  const around = await surroundingsOf(tx, clinicId, [fields.identity]);
  const kept = asKept(fields, around.country);
  const earlier = await tx.$count(patients, and(eq(patients.clinicId, clinicId), eq(patients.id, id)));
  if (earlier > 0) {
    if (!(await isEnrolled(tx, actor, id, { ...kept, consent }))) throw new Problem('id-conflict');
    return recordOf(tx, site, actor, id, now);
  }
  const today = localDateIn(fields.identity.timeZone, now);
  refuseAny([...recordErrors(fields, around, now), ...consentErrors(consent, today)]);
  await writePatient(tx, site, actor, { id, invite, consent, country: around.country, ...kept }, now);
  return recordOf(tx, site, actor, id, now);
};
