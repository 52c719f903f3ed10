import { randomUUID } from 'node:crypto';
import { isClinician, type Role } from '#shared/access/permissions.ts';
import { withTx } from '#server/db/with-tx.ts';
import { lockStoredFields, revisionOf } from '#server/features/patients/stored.ts';
import { makePatient, makePerson, type TestPatient, type TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { plantGrant } from '../caregivers/grants.ts';
import { enrolBody, listOf, rowOf } from '../patients/bodies.ts';
import { nothing, ownOnly, wholeClinic, type RouteFixture } from './fixture.ts';
import type { Relation } from './scene.ts';

/** Another patient of the same clinic with the same care team, whom a call may move, change or end. */
const likeOwner = async (database: TestDatabase, owner: TestPatient): Promise<TestPatient> => {
  const made = await makePatient(database, owner.clinicId);
  await database.asSuperuser.query(
    `insert into care_team_members (clinic_id, patient_id, person_id, is_lead)
     select clinic_id, $2, person_id, is_lead from care_team_members where patient_id = $1`,
    [owner.patientId, made.patientId],
  );
  // Nobody of them has come yet, so that they can be invited.
  await database.asSuperuser.query('delete from credentials where person_id = $1', [made.personId]);
  return made;
};

const patient =
  (body?: (cast: Parameters<RouteFixture['request']>[1]) => unknown): RouteFixture['request'] =>
  async (database, cast) => ({
    id: (await likeOwner(database, cast.owner)).patientId,
    body: body?.(cast),
  });

/** As the record names it to whoever has opened it: that somebody may not is what the table is about. */
const revisionAt = (
  database: TestDatabase,
  { clinicId, patientId }: TestPatient,
  { personId }: TestPerson,
) => {
  const reader = { kind: 'person' as const, clinicId, personId, roles: [], patientId: null, caring: null };
  return withTx(database.pools.app, reader, async (tx) =>
    revisionOf(await lockStoredFields(tx, reader, patientId)),
  );
};

const outsideTeam = (_role: Role, relation: Relation) =>
  relation === "colleague's" || relation === "other patient's";

const onPatients = { param: 'patientId', door: wholeClinic } as const;
const onCharts = { ...onPatients, asksReason: outsideTeam } as const;

const limits = { relationship: 'daughter', mayCheckIn: true, mayMessage: true, until: null };
const invited = () => {
  const id = randomUUID();
  return { id, name: 'Amara Lindqvist', email: `${id}@people.example`, ...limits };
};

const grant =
  (body?: () => unknown): RouteFixture['request'] =>
  async (database, { owner }) => {
    const somebody = await makePerson(database, owner.clinicId, ['caregiver']);
    const { caregiverId } = await plantGrant(database, owner, somebody);
    return { id: caregiverId, body: body?.() };
  };
const onGrants = { param: 'caregiverId', door: ownOnly } as const;

export const patientFixtures: Record<string, RouteFixture> = {
  'get /api/patients': {
    request: nothing,
    patientsIn: (body) => (body as { patients: { id: string }[] }).patients.map(({ id }) => id),
  },
  'post /api/patients': { request: async (_database, { actor }) => ({ body: enrolBody(actor) }) },
  'get /api/patients/:patientId': { ...onCharts, request: patient() },
  'post /api/patients/:patientId/openings': {
    ...onPatients,
    request: patient(() => ({ reason: 'Covering today.' })),
  },
  'put /api/patients/:patientId': {
    ...onCharts,
    request: async (database, { actor, owner }) => {
      const made = await likeOwner(database, owner);
      const { identity, operation, careTeam } = enrolBody(actor);
      const revision = await revisionAt(database, made, actor);
      return { id: made.patientId, body: { revision, identity, operation, careTeam } };
    },
  },
  'post /api/patients/:patientId/moves': {
    ...onCharts,
    request: patient(() => ({ move: 'pause', reason: 'In hospital.' })),
  },
  'post /api/patients/:patientId/invitations': {
    ...onPatients,
    asksReason: (role, relation) => isClinician([role]) && outsideTeam(role, relation),
    request: patient(() => ({ byEmail: false })),
  },
  'get /api/clinicians': { request: nothing },
  'post /api/patient-imports/preview': {
    request: async (_database, { actor }) => ({ body: { text: listOf([rowOf(actor)]) } }),
  },
  'post /api/patient-imports': {
    request: async (_database, { actor }) => ({
      body: { text: listOf([rowOf(actor)]), invite: 'not-yet' },
    }),
  },

  'get /api/caregivers': { request: nothing },
  'post /api/caregivers': { request: async () => ({ body: invited() }) },
  'put /api/caregivers/:caregiverId': { ...onGrants, request: grant(() => limits) },
  'delete /api/caregivers/:caregiverId': { ...onGrants, request: grant() },
  'post /api/patients/:patientId/caregivers': {
    ...onCharts,
    request: patient(() => ({ ...invited(), byEmail: false, consent: 'Said so at the visit.' })),
  },
  'delete /api/patients/:patientId/caregivers/:caregiverId': {
    ...onCharts,
    request: async (database, { owner }) => {
      const made = await likeOwner(database, owner);
      const somebody = await makePerson(database, owner.clinicId, ['caregiver']);
      const { caregiverId } = await plantGrant(database, made, somebody);
      return { id: made.patientId, also: { caregiverId } };
    },
  },
  'get /api/activity': { request: nothing },
};
