import { randomUUID } from 'node:crypto';
import type { Role } from '#shared/access/permissions.ts';
import type { InvitationCard, StaffPerson } from '#shared/people/contract.ts';
import type { InvitationKind } from '#shared/people/invitations.ts';
import { withTx } from '#server/db/with-tx.ts';
import { linkTokenOf, shortCodeOf } from '#server/features/accounts/one-time-tokens.ts';
import { invitePerson } from '#server/features/people/inviting.ts';
import { addPerson } from '#server/features/people/new-person.ts';
import type { TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import type { Answer, TestBrowser } from '#tests/support/web.ts';

export const newPassword = 'seven lanterns over a quiet harbor';

export const siteOf = ({ pools }: TestDatabase) => ({
  gate: pools.gate,
  publicUrl: 'http://localhost',
  ...testSecrets,
});

export const linkOf = (id: string) => ({ token: linkTokenOf(testSecrets.tokenSecret, id) });
export const codeOf = (id: string) => ({ code: shortCodeOf(testSecrets.tokenSecret, id) });

/** Somebody on record who has no way in yet. */
export const plantNewcomer = async (
  database: TestDatabase,
  by: TestPerson,
  roles: Role[],
  email?: string,
): Promise<TestPerson> => {
  const personId = randomUUID();
  const person = {
    personId,
    clinicId: by.clinicId,
    name: 'Marta Quell',
    email: email ?? `${personId}@new.example`,
  };
  await withTx(database.pools.app, { kind: 'person', ...by }, (tx) =>
    addPerson(tx, by, { id: personId, name: person.name, email: person.email, roles }, new Date()),
  );
  return person;
};

export const invite = (
  database: TestDatabase,
  by: TestPerson,
  { personId }: { personId: string },
  options: { kind?: InvitationKind; byEmail?: boolean; now?: Date } = {},
): Promise<InvitationCard> =>
  withTx(database.pools.app, { kind: 'person', ...by }, (tx) =>
    invitePerson(
      tx,
      siteOf(database),
      by,
      { personId, kind: options.kind ?? 'patient', byEmail: options.byEmail ?? false },
      options.now ?? new Date(),
    ),
  );

/** A newcomer with an open invitation. */
export const plantInvited = async (
  database: TestDatabase,
  by: TestPerson,
  kind: InvitationKind = 'patient',
  email?: string,
) => {
  const role = kind === 'staff' ? 'therapist' : kind;
  const person = await plantNewcomer(database, by, [role], email);
  return { person, card: await invite(database, by, person, { kind }) };
};

export const problemOf = ({ status, body }: Answer) => ({
  status,
  ...(body as { type?: string; detail?: string; errors?: { field: string; message: string }[] }),
});

export const inviteBody = (over: Record<string, unknown> = {}) => {
  const id = randomUUID();
  return {
    id,
    name: 'Ilse Brandt',
    credential: 'PT',
    email: `${id}@staff.example`,
    phone: null,
    timeZone: null,
    roles: ['therapist'],
    ...over,
  };
};

export const staffOf = async (browser: TestBrowser, personId: string): Promise<StaffPerson> => {
  const { body } = await browser.call('get', '/api/people');
  const found = (body as { people: StaffPerson[] }).people.find(({ id }) => id === personId);
  if (!found) throw new Error('The list does not show that person.');
  return found;
};

/** How many rows of a table fit. */
export const countOf = async (
  { asSuperuser }: TestDatabase,
  table: string,
  where: string,
  values: unknown[],
): Promise<number> => {
  const { rows } = await asSuperuser.query<{ n: number }>(
    `select count(*)::int as n from ${table} where ${where}`,
    values,
  );
  return rows[0]?.n ?? 0;
};
