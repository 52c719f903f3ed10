import { createHash } from 'node:crypto';
import { Secret } from 'otpauth';
import { isStaff } from '#shared/access/permissions.ts';
import { hashPassword } from '../features/accounts/passwords.ts';
import type { authenticators, credentials } from '../db/schema/gate.ts';
import { authenticatorPurpose, seal } from '../features/accounts/sealing.ts';
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

/** The demo's authenticator app of somebody: like the passwords published, and worth nothing elsewhere. */
const authenticatorSecretOf = (email: string): string => {
  const bytes = createHash('sha256')
    .update(`orchard-lane authenticator of ${email}`)
    .digest()
    .subarray(0, 20);
  return new Secret({ buffer: new Uint8Array(bytes).buffer }).base32;
};

const staffWithAccounts = staff.filter(({ roles }) => isStaff(roles));

/** Whose codes the outbox shows, since nobody has an app at hand that holds the demo's secrets. */
export const demoAuthenticatorSecrets = staffWithAccounts.map(({ name, email }) => ({
  name,
  email,
  secret: authenticatorSecretOf(email),
}));

export const demoAuthenticators = (sealSecret: string, at: Date): (typeof authenticators.$inferInsert)[] =>
  staffWithAccounts.map(({ key, email }) => ({
    personId: staffId(key),
    clinicId: demoClinicId,
    sealedSecret: seal(sealSecret, authenticatorPurpose, authenticatorSecretOf(email)),
    confirmedAt: at,
  }));
