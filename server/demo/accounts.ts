import { hashPassword } from '../features/accounts/passwords.ts';
import type { credentials } from '../db/schema/gate.ts';
import { demoClinicId } from './clinic.ts';
import { patientsOfDemo, personIdOf } from './patients.ts';
import { staff, staffId } from './staff.ts';

type DemoAccount = { who: string; role: string; email: string; password: string };

type Way = DemoAccount & { personId: string };

/** Long enough for the product, and worth nothing outside this clinic of invented people. */
const passwordFor = (name: string): string =>
  `orchard-lane-${(name.split(' ')[0] ?? name).toLowerCase()}-2026`;

const waysIn: readonly Way[] = [
  ...staff.map(({ key, name, credential, email, role }) => ({
    personId: staffId(key),
    who: credential ? `${name}, ${credential}` : name,
    role,
    email,
    password: passwordFor(name),
  })),
  ...patientsOfDemo
    .filter(({ hasAccount }) => hasAccount)
    .map(({ name, email }) => ({
      personId: personIdOf(name),
      who: name,
      role: 'patient',
      email,
      password: passwordFor(name),
    })),
];

/** Whom the demo can be entered as, for the list at the start. */
export const demoAccounts: readonly DemoAccount[] = waysIn.map(({ who, role, email, password }) => ({
  who,
  role,
  email,
  password,
}));

export const demoCredentials = (): Promise<(typeof credentials.$inferInsert)[]> =>
  Promise.all(
    waysIn.map(async ({ personId, email, password }) => ({
      clinicId: demoClinicId,
      personId,
      email,
      passwordHash: await hashPassword(password),
    })),
  );
