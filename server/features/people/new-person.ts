import { createHash } from 'node:crypto';
import { and, eq, sql } from 'drizzle-orm';
import { parsePhoneNumberFromString, type CountryCode } from 'libphonenumber-js/max';
import type { Role } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import { people, personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { holdTurn } from './turns.ts';

const refuseField = (field: string, message: string): Problem =>
  new Problem('invalid-input', undefined, { errors: [{ field, message }] });

/** A telephone number in E.164; one without a country code is read as one of the clinic's country. */
export const readPhone = (text: string, country: string, field = 'phone'): string => {
  const parsed = parsePhoneNumberFromString(text, country as CountryCode);
  if (!parsed?.isValid()) {
    throw refuseField(
      field,
      'That is not a telephone number. Give it with its area code, and with + and the country code from abroad.',
    );
  }
  if (['PREMIUM_RATE', 'SHARED_COST'].includes(parsed.getType() ?? '')) {
    throw refuseField(field, 'A number that costs extra cannot be rung from here. Give another one.');
  }
  if (parsed.ext) throw refuseField(field, 'Give a number that rings without an extension.');
  return parsed.number;
};

/**
 * The id of a person whom a client asked to add under an id that it made. Ways in are found by a person's id
 * across all clinics, so no client may choose one: somebody of another clinic could have it.
 */
export const personIdFor = (clinicId: string, clientId: string): string => {
  const hex = createHash('sha256').update(`person:${clinicId}:${clientId}`).digest('hex');
  // The version and variant of RFC 9562 for ids of one's own making (version 8).
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
};

type NewPerson = {
  /** Random, or made by `personIdFor`. */
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
  credential?: string | null;
  /** E.164. */
  phone?: string | null;
  timeZone?: string | null;
};

/** Puts somebody on record, without a way in. Nobody shares an address with anybody else of the clinic. */
export const addPerson = async (
  tx: Tx,
  { clinicId }: { clinicId: string },
  { roles, ...person }: NewPerson,
  now: Date,
): Promise<void> => {
  const email = normaliseEmail(person.email);
  await holdTurn(tx, clinicId, 'address-is-taken');
  const taken = await tx.$count(
    people,
    and(eq(people.clinicId, clinicId), sql`lower(${people.email}) = ${email}`),
  );
  if (taken > 0) throw refuseField('email', 'Somebody of this clinic has this e-mail address already.');
  const added = await tx
    .insert(people)
    .values({ ...person, clinicId, email, createdAt: now })
    .onConflictDoNothing()
    .returning({ id: people.id });
  if (added.length === 0) throw new Problem('id-conflict');
  if (roles.length === 0) return;
  await tx.insert(personRoles).values(roles.map((role) => ({ clinicId, personId: person.id, role })));
};
