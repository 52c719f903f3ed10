import { roles, type Role } from '#shared/access/permissions.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { plantGrant } from '../caregivers/grants.ts';

/** Whose row is asked for, as seen from the one who asks. */
export const relations = ['own', "colleague's", "other patient's", "other clinic's"] as const;
export type Relation = (typeof relations)[number];

/** Somebody who acts, and for each relation a patient whose rows they ask for. */
export type Cast = { actor: TestPerson; rowsOf: Record<Relation, TestPatient> };

export type Scene = {
  /**
   * One person a role. A patient's own rows are the patient's, a caregiver's those of whom they look after; anybody
   * else is on the care team of `own`.
   */
  casts: Record<Role, Cast>;
  /** Who would work on rows of the other clinic. */
  otherTherapist: TestPerson;
};

export const setScene = async (database: TestDatabase): Promise<Scene> => {
  const [here, there] = [await makeClinic(database), await makeClinic(database)];
  const colleague = await makePerson(database, here, ['therapist']);
  const otherTherapist = await makePerson(database, there, ['therapist']);
  const rowsOfOthers = {
    "colleague's": await makePatient(database, here, { lead: colleague }),
    "other patient's": await makePatient(database, here),
    "other clinic's": await makePatient(database, there, { lead: otherTherapist }),
  };
  const casts: Partial<Record<Role, Cast>> = {};
  for (const role of roles) {
    if (role === 'patient') {
      const own = await makePatient(database, here, { lead: colleague });
      casts[role] = { actor: own, rowsOf: { own, ...rowsOfOthers } };
    } else if (role === 'caregiver') {
      const actor = await makePerson(database, here, [role]);
      const own = await makePatient(database, here, { lead: colleague });
      await plantGrant(database, own, actor);
      casts[role] = { actor, rowsOf: { own, ...rowsOfOthers } };
    } else {
      const actor = await makePerson(database, here, [role]);
      const own = await makePatient(database, here, { lead: actor });
      casts[role] = { actor, rowsOf: { own, ...rowsOfOthers } };
    }
  }
  return { casts: casts as Record<Role, Cast>, otherTherapist };
};
