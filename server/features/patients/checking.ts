import { and, eq, inArray, or, sql } from 'drizzle-orm';
import { parsePhoneNumberFromString, type CountryCode } from 'libphonenumber-js/max';
import type { EnrolPatient } from '#shared/patients/contract.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem, type FieldError } from '#shared/problems/problems.ts';
import { patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import { readPhone } from '../people/new-person.ts';
import { cliniciansOf } from './queries.ts';

export type RecordFields = Pick<EnrolPatient, 'identity' | 'operation' | 'careTeam'>;

/** What the clinic has already, as far as given records could clash with it. */
export type Surroundings = {
  country: string;
  clinicians: ReadonlySet<string>;
  /** Whose address it is: the person. */
  emails: ReadonlyMap<string, string>;
  /** Whose number it is: the person. */
  chartNumbers: ReadonlyMap<string, string>;
};

export const surroundingsOf = async (
  tx: Tx,
  clinicId: string,
  records: readonly { email: string; chartNumber: string }[],
): Promise<Surroundings> => {
  const emails = [...new Set(records.map(({ email }) => normaliseEmail(email)))];
  const charts = [...new Set(records.map(({ chartNumber }) => chartNumber))];
  const rows = await tx
    .select({ personId: people.id, email: people.email, chartNumber: patients.chartNumber })
    .from(people)
    .leftJoin(patients, and(eq(patients.clinicId, people.clinicId), eq(patients.personId, people.id)))
    .where(
      and(
        eq(people.clinicId, clinicId),
        or(inArray(sql`lower(${people.email})`, emails), inArray(patients.chartNumber, charts)),
      ),
    );
  const clinicians = await cliniciansOf(tx, clinicId);
  return {
    country: (await clinicOf(tx, clinicId)).country,
    clinicians: new Set(clinicians.map(({ personId }) => personId)),
    emails: new Map(rows.map(({ email, personId }) => [normaliseEmail(email), personId])),
    chartNumbers: new Map(
      rows.flatMap(({ chartNumber, personId }) => (chartNumber ? [[chartNumber, personId] as const] : [])),
    ),
  };
};

const yearsAfter = (date: string, years: number): string =>
  `${String(Number(date.slice(0, 4)) + years).padStart(4, '0')}${date.slice(4)}`;

const oldestYears = 120;
const surgeryWithinYears = 2;

/** What is wrong with dates that each is a date; today is that of the patient's own calendar. */
const dateErrors = ({ identity, operation }: RecordFields, today: string): FieldError[] => {
  const errors: FieldError[] = [];
  const { birthDate } = identity;
  if (birthDate > today) {
    errors.push({ field: 'identity.birthDate', message: 'The date of birth lies in the future.' });
  }
  if (birthDate < yearsAfter(today, -oldestYears)) {
    errors.push({ field: 'identity.birthDate', message: 'That is over 120 years ago.' });
  }
  const { surgeryDate } = operation;
  const isFar =
    surgeryDate > yearsAfter(today, surgeryWithinYears) ||
    surgeryDate < yearsAfter(today, -surgeryWithinYears);
  if (isFar) {
    errors.push({ field: 'operation.surgeryDate', message: 'That is over two years away. Check the year.' });
  }
  return errors;
};

const problemsOf = (read: () => unknown): FieldError[] => {
  try {
    read();
    return [];
  } catch (error) {
    if (error instanceof Problem && error.extra.errors) return error.extra.errors;
    throw error;
  }
};

/**
 * Everything that is wrong with a record beyond its form, all at once. `self` is the person whose record it is
 * already, so that nobody clashes with themselves.
 */
export const recordErrors = (
  fields: RecordFields,
  around: Surroundings,
  now: Date,
  self: string | null = null,
): FieldError[] => {
  const { identity, careTeam } = fields;
  const errors = dateErrors(fields, localDateIn(identity.timeZone, now));
  errors.push(...problemsOf(() => readPhone(identity.phone, around.country, 'identity.phone')));
  const emailOf = around.emails.get(normaliseEmail(identity.email));
  if (emailOf !== undefined && emailOf !== self) {
    errors.push({
      field: 'identity.email',
      message: 'Somebody of this clinic has this e-mail address already.',
    });
  }
  const chartOf = around.chartNumbers.get(identity.chartNumber);
  if (chartOf !== undefined && chartOf !== self) {
    errors.push({ field: 'identity.chartNumber', message: 'Another patient has this chart number.' });
  }
  if (careTeam.some(({ personId }) => !around.clinicians.has(personId))) {
    errors.push({ field: 'careTeam', message: 'Choose clinicians who work for the clinic now.' });
  }
  return errors;
};

export const consentErrors = (consent: EnrolPatient['consent'], today: string): FieldError[] =>
  consent.on > today ? [{ field: 'consent.on', message: 'That day has not come yet.' }] : [];

export const refuseAny = (errors: FieldError[]): void => {
  if (errors.length > 0) throw new Problem('invalid-input', undefined, { errors });
};

/**
 * A number that has been checked, as people of the clinic's country read it. What pages ring is kept beside it,
 * in E.164.
 */
const readable = (phone: string, country: string): string => {
  const parsed = parsePhoneNumberFromString(phone, country as CountryCode);
  if (!parsed) return phone;
  return parsed.country === country ? parsed.formatNational() : parsed.formatInternational();
};

/** The same record as it is kept: address and number in one form, the team in one order. */
export const asKept = ({ identity, operation, careTeam }: RecordFields, country: string) => ({
  identity: {
    ...identity,
    email: normaliseEmail(identity.email),
    phone: readable(identity.phone, country),
  },
  operation,
  careTeam: careTeam.toSorted((a, b) => a.personId.localeCompare(b.personId)),
});

export type KeptRecord = ReturnType<typeof asKept>;
