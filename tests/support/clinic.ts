import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { Role } from '#shared/access/permissions.ts';
import type { OpeningHours } from '#shared/clinic/hours.ts';
import { addDays } from '#shared/plans/calendar.ts';
import { reverseReplacement } from '#shared/plans/reverse-replacement.ts';
import { clinics } from '#server/db/schema/clinics.ts';
import { credentials } from '#server/db/schema/gate.ts';
import { careTeamMembers, operationCards, patients } from '#server/db/schema/patients.ts';
import { people, personRoles } from '#server/db/schema/people.ts';
import { plans } from '#server/db/schema/plans.ts';
import { hashPassword } from '#server/features/accounts/passwords.ts';
import type { TestDatabase } from './database.ts';

export const testPassword = 'a long test passphrase';
let testHash: Promise<string> | undefined;

/** Every weekday around the clock, so that a test is in hours unless it says otherwise. */
const alwaysOpen: OpeningHours = [0, 1, 2, 3, 4, 5, 6].map((weekday) => ({
  weekday,
  opens: '00:00',
  closes: '23:59',
}));

export type TestPerson = { clinicId: string; personId: string; name: string; email: string };
export type TestPatient = TestPerson & { patientId: string; surgeryDate: string };

const db = ({ asSuperuser }: TestDatabase) => drizzle({ client: asSuperuser, casing: 'snake_case' });

export const makeClinic = async (
  database: TestDatabase,
  overrides: Partial<typeof clinics.$inferInsert> = {},
): Promise<string> => {
  const id = randomUUID();
  await db(database)
    .insert(clinics)
    .values({
      id,
      name: 'Test Clinic',
      timeZone: 'America/New_York',
      emergencyNumber: '911',
      crisisNumber: '988',
      onCallNumber: '555-0101',
      phone: '555-0100',
      openingHours: alwaysOpen,
      ...overrides,
    });
  return id;
};

/** Somebody with an account, a password and roles. */
export const makePerson = async (
  database: TestDatabase,
  clinicId: string,
  roles: Role[],
  name = `Person ${randomUUID().slice(0, 8)}`,
): Promise<TestPerson> => {
  const personId = randomUUID();
  const email = `${personId}@people.example`;
  await db(database).insert(people).values({ clinicId, id: personId, name, email, createdAt: new Date() });
  await db(database)
    .insert(personRoles)
    .values(roles.map((role) => ({ clinicId, personId, role })));
  testHash ??= hashPassword(testPassword);
  await db(database)
    .insert(credentials)
    .values({ clinicId, personId, email, passwordHash: await testHash });
  return { clinicId, personId, name, email };
};

/** A patient with account, operation card and plan, so many days after surgery, on somebody's care team. */
export const makePatient = async (
  database: TestDatabase,
  clinicId: string,
  options: {
    name?: string;
    day?: number;
    today?: string;
    lead?: TestPerson;
    patient?: Partial<typeof patients.$inferInsert>;
    card?: Partial<typeof operationCards.$inferInsert>;
  } = {},
): Promise<TestPatient> => {
  const person = await makePerson(database, clinicId, ['patient'], options.name);
  const patientId = randomUUID();
  const today = options.today ?? new Date().toISOString().slice(0, 10);
  const surgeryDate = addDays(today, -(options.day ?? 24));
  await db(database)
    .insert(patients)
    .values({
      clinicId,
      id: patientId,
      personId: person.personId,
      chartNumber: `T-${patientId.slice(0, 8)}`,
      birthDate: '1956-04-12',
      phone: '555-0123',
      address: '1 Test Lane',
      timeZone: 'America/New_York',
      dominantHand: 'right',
      emergencyContact: 'Kin, 555-0124',
      bloodThinner: 'none',
      createdAt: new Date(),
      ...options.patient,
    });
  await db(database)
    .insert(operationCards)
    .values({
      clinicId,
      patientId,
      procedure: 'reverse-replacement',
      arm: 'left',
      surgeryDate,
      surgeon: 'Dr. Mbeki-Stone',
      approach: 'deltopectoral',
      subscapularis: 'repaired',
      biceps: 'tenodesis',
      block: 'single',
      dressingUntilDay: 10,
      ...options.card,
    });
  await db(database).insert(plans).values({
    clinicId,
    patientId,
    protocolCode: reverseReplacement.code,
    protocolVersion: reverseReplacement.version,
    content: reverseReplacement,
    createdAt: new Date(),
  });
  if (options.lead) {
    await db(database)
      .insert(careTeamMembers)
      .values({ clinicId, patientId, personId: options.lead.personId, isLead: true });
  }
  return { ...person, patientId, surgeryDate };
};
