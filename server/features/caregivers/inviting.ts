import { and, eq, isNull, lt, ne, sql } from 'drizzle-orm';
import type { CaregiverCard, ClinicCaregiverCard } from '#shared/patients/contract.ts';
import { plainText } from '#shared/patients/search.ts';
import { consequences } from '#shared/patients/states.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { notify } from '../../notifications/service.ts';
import { announcePersonChange } from '../../realtime/announce.ts';
import { personOf } from '../accounts/queries.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { writeAudit } from '../audit/service.ts';
import { chartVisibleTo, patientOfClinic, type PatientRow } from '../patients/door.ts';
import { invitePerson } from '../people/inviting.ts';
import { addPerson, personIdFor } from '../people/new-person.ts';
import { holdTurn } from '../people/turns.ts';
import { cardForClinic, cardForPatient } from './cards.ts';
import { ownRecord } from './limits.ts';
import type { CaregiverRow } from './queries.ts';

export type Limits = {
  relationship: string;
  mayCheckIn: boolean;
  mayMessage: boolean;
  until: string | null;
};

type Invited = Limits & { id: string; name: string; email: string };

const refuse = (field: string, message: string): Problem =>
  new Problem('invalid-input', undefined, { errors: [{ field, message }] });

/** A last day that is over already would let nobody in. */
export const refusePast = (patient: PatientRow, until: string | null, now: Date): void => {
  if (until !== null && until < localDateIn(patient.timeZone, now))
    throw refuse('until', 'That day is past.');
};

/** An address without what only looks different. */
const bare = (email: string): string => plainText(normaliseEmail(email));

type Somebody = { id: string; isNew: boolean; roles: string[]; hasCome: boolean };

/** Whose address it is; whoever is of the clinic already keeps the name they have. */
const whoHas = async (tx: Tx, clinicId: string, email: string): Promise<Omit<Somebody, 'isNew'> | null> => {
  const rows = await tx
    .select({
      id: people.id,
      active: people.active,
      firstSignedInAt: people.firstSignedInAt,
      role: personRoles.role,
    })
    .from(people)
    .leftJoin(
      personRoles,
      and(eq(personRoles.clinicId, people.clinicId), eq(personRoles.personId, people.id)),
    )
    .where(and(eq(people.clinicId, clinicId), sql`lower(${people.email}) = ${normaliseEmail(email)}`));
  const first = rows[0];
  if (!first) return null;
  // Access that the clinic ended is not given back by the way.
  if (!first.active) throw refuse('email', 'This address cannot be let in here. Please ask the clinic.');
  return {
    id: first.id,
    roles: rows.flatMap(({ role }) => (role ? [role] : [])),
    hasCome: first.firstSignedInAt !== null,
  };
};

const findOrAdd = async (
  tx: Tx,
  actor: PersonActor,
  { id, name, email }: Invited,
  now: Date,
): Promise<Somebody> => {
  const known = await whoHas(tx, actor.clinicId, email);
  if (!known) {
    // A patient may have been enrolled under the same id: the two are not one person.
    const personId = personIdFor(actor.clinicId, `caregiver:${id}`);
    await addPerson(tx, actor, { id: personId, name, email, roles: ['caregiver'] }, now);
    return { id: personId, isNew: true, roles: ['caregiver'], hasCome: false };
  }
  await tx
    .insert(personRoles)
    .values({ clinicId: actor.clinicId, personId: known.id, role: 'caregiver' })
    .onConflictDoNothing();
  return { ...known, isNew: false };
};

/** A grant whose last day is over stands in nobody's way. */
const endLapsed = async (tx: Tx, patient: PatientRow, personId: string, now: Date): Promise<void> => {
  await tx
    .update(caregivers)
    .set({ endedAt: now })
    .where(
      and(
        eq(caregivers.clinicId, patient.clinicId),
        eq(caregivers.patientId, patient.id),
        eq(caregivers.personId, personId),
        isNull(caregivers.endedAt),
        lt(caregivers.untilDate, localDateIn(patient.timeZone, now)),
      ),
    );
};

const isSame = async (tx: Tx, row: CaregiverRow, given: Grant): Promise<boolean> => {
  const { email } = await personOf(tx, row);
  return (
    row.patientId === given.patient.id &&
    normaliseEmail(email) === normaliseEmail(given.email) &&
    row.calledName === given.name &&
    row.relationship === given.relationship &&
    row.mayCheckIn === given.mayCheckIn &&
    row.mayMessage === given.mayMessage &&
    row.untilDate === given.until &&
    row.consent === given.consent
  );
};

/**
 * Patients and staff who have not come yet have an invitation of their own, which this must not replace: the letter
 * of a caregiver is there for every clinician. Staff hold no role as long as a second person has not confirmed it.
 */
const comesAsCaregiver = async (tx: Tx, clinicId: string, { id, roles }: Somebody): Promise<boolean> => {
  if (roles.some((role) => role !== 'caregiver')) return false;
  const others = await tx.$count(
    invitations,
    and(eq(invitations.clinicId, clinicId), eq(invitations.personId, id), ne(invitations.kind, 'caregiver')),
  );
  return others === 0;
};

type Grant = Invited & { patient: PatientRow; consent: string | null; byEmail: boolean };

/**
 * Everybody who is let in gets word of it: an invitation where this brings them here, else a mail that they are
 * asked to help. Whoever invited cannot tell the two apart.
 */
const sendWord = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { somebody, grant, byEmail }: { somebody: Somebody; grant: CaregiverRow; byEmail: boolean },
  now: Date,
): Promise<void> => {
  const { clinicId } = actor;
  if (!somebody.hasCome && (await comesAsCaregiver(tx, clinicId, somebody))) {
    await invitePerson(tx, site, actor, { personId: somebody.id, kind: 'caregiver', byEmail }, now);
    return;
  }
  const told = { kind: 'caring-began', occasion: `caring:${grant.id}`, path: '/caring' } as const;
  await notify(tx, clinicId, [somebody.id], told, now);
};

/** Lets somebody in, and brings them here where they have no way in yet. A repeat is the same grant. */
const grantCare = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  given: Grant,
  now: Date,
): Promise<CaregiverRow> => {
  const { patient, name: calledName, relationship, mayCheckIn, mayMessage, until, consent, byEmail } = given;
  const { clinicId } = actor;
  // Whose address it is stays so until this is written.
  await holdTurn(tx, clinicId, 'address-is-taken');
  const earlier = await tx
    .select()
    .from(caregivers)
    .where(and(eq(caregivers.clinicId, clinicId), eq(caregivers.id, given.id)));
  if (earlier[0]) {
    if (!(await isSame(tx, earlier[0], given))) throw new Problem('id-conflict');
    return earlier[0];
  }
  refusePast(patient, until, now);
  const own = await personOf(tx, patient);
  if (bare(own.email) === bare(given.email))
    throw refuse('email', 'Each person needs an address of their own.');
  const somebody = await findOrAdd(tx, actor, given, now);
  await endLapsed(tx, patient, somebody.id, now);
  const rows = await tx
    .insert(caregivers)
    .values({
      clinicId,
      id: given.id,
      patientId: patient.id,
      personId: somebody.id,
      calledName,
      relationship,
      mayCheckIn,
      mayMessage,
      untilDate: until,
      grantedBy: actor.personId,
      consent,
      createdAt: now,
    })
    .onConflictDoNothing()
    .returning();
  const grant = rows[0];
  if (!grant) throw refuse('email', 'This person is let in already. Change what they may do instead.');
  await sendWord(tx, site, actor, { somebody, grant, byEmail }, now);
  await writeAudit(
    tx,
    actor,
    {
      action: 'caregiver.invited',
      subjectId: grant.id,
      patientId: patient.id,
      detail: { mayCheckIn, mayMessage },
    },
    now,
  );
  await announcePersonChange(tx, somebody.id);
  return grant;
};

/** The patient lets somebody in. */
export const inviteByPatient = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  input: Invited,
  now: Date,
): Promise<CaregiverCard> => {
  const patient = await patientOfClinic(tx, actor.clinicId, ownRecord(actor));
  const given = { ...input, patient, consent: null, byEmail: true };
  return cardForPatient(tx, await grantCare(tx, site, actor, given, now));
};

/** The clinic lets somebody in, as the patient agreed. */
export const inviteByClinic = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { patientId, ...input }: Invited & { patientId: string; consent: string; byEmail: boolean },
  now: Date,
): Promise<ClinicCaregiverCard> => {
  const patient = await chartVisibleTo(tx, actor, patientId, now);
  if (!consequences[patient.state].signIn) {
    throw new Problem('state-conflict', 'This patient’s record has ended.');
  }
  const grant = await grantCare(tx, site, actor, { ...input, patient }, now);
  return cardForClinic(tx, site, grant, now);
};
