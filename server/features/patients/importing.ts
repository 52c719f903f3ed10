import { randomUUID } from 'node:crypto';
import type { EnrolPatient } from '#shared/patients/contract.ts';
import type { ImportPreview } from '#shared/patients/import-contract.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem, type FieldError } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { holdTurn } from '../people/turns.ts';
import {
  asKept,
  consentErrors,
  recordErrors,
  surroundingsOf,
  type RecordFields,
  type Surroundings,
} from './checking.ts';
import { writePatient } from './enrolment.ts';
import { columnOfPath, readList, type CellError, type ImportRow } from './import-reading.ts';
import { cliniciansOf } from './queries.ts';

type Checked = {
  row: ImportRow;
  lead: string;
  errors: CellError[];
  alreadyEnrolled: boolean;
  /** What would be enrolled; null where a cell is not right. */
  patient: (RecordFields & Pick<EnrolPatient, 'consent'>) | null;
};

type Clinician = Awaited<ReturnType<typeof cliniciansOf>>[number];

/** Columns that no two rows of a list may share, with what to say of it. */
const unlike = [
  { column: 'chart_number', of: ({ cells }: ImportRow) => cells.chart_number.trim() },
  { column: 'email', of: ({ cells }: ImportRow) => normaliseEmail(cells.email) },
] as const;

const repeats = (rows: readonly ImportRow[], row: ImportRow): CellError[] =>
  unlike.flatMap(({ column, of }) => {
    const value = of(row);
    const other = value === '' ? undefined : rows.find((one) => one !== row && of(one) === value);
    return other ? [{ column, message: `Line ${other.line} has the same.` }] : [];
  });

/** Chart number and e-mail belong to one person who is a patient here. */
const isEnrolled = ({ cells }: ImportRow, around: Surroundings): boolean => {
  const personId = around.chartNumbers.get(cells.chart_number.trim());
  return personId !== undefined && personId === around.emails.get(normaliseEmail(cells.email));
};

const checkRow = (
  row: ImportRow,
  rows: readonly ImportRow[],
  around: Surroundings,
  clinicians: readonly Clinician[],
  now: Date,
): Checked => {
  const leadEmail = normaliseEmail(row.cells.lead_email);
  const lead = clinicians.find(({ email }) => normaliseEmail(email) === leadEmail);
  const named = { row, lead: lead?.name ?? row.cells.lead_email.trim() };
  const same = repeats(rows, row);
  if (same.length === 0 && isEnrolled(row, around)) {
    return { ...named, errors: [], alreadyEnrolled: true, patient: null };
  }
  const errors = [...row.errors, ...same];
  if (!lead) {
    const message =
      leadEmail === ''
        ? 'Enter the e-mail address of the lead therapist.'
        : 'No clinician who works for the clinic now has this e-mail address.';
    errors.push({ column: 'lead_email', message });
  }
  if (!row.fields) return { ...named, errors, alreadyEnrolled: false, patient: null };
  const { consent, ...fields } = row.fields;
  const patient = { ...fields, consent, careTeam: lead ? [{ personId: lead.personId, isLead: true }] : [] };
  const found: FieldError[] = [
    ...recordErrors(patient, around, now),
    ...consentErrors(consent, localDateIn(fields.identity.timeZone, now)),
  ];
  errors.push(...found.map(({ field, message }) => ({ column: columnOfPath(field), message })));
  return { ...named, errors, alreadyEnrolled: false, patient: errors.length === 0 ? patient : null };
};

const checkList = async (tx: Tx, clinicId: string, text: string, now: Date) => {
  const { rows, problems } = readList(text);
  const around = await surroundingsOf(
    tx,
    clinicId,
    rows.map(({ cells }) => ({ email: cells.email, chartNumber: cells.chart_number.trim() })),
  );
  const clinicians = await cliniciansOf(tx, clinicId);
  return { problems, around, checked: rows.map((row) => checkRow(row, rows, around, clinicians, now)) };
};

/** What would happen with a list. Nothing is written. */
export const preview = async (
  tx: Tx,
  actor: PersonActor,
  text: string,
  now: Date,
): Promise<ImportPreview> => {
  const { problems, checked } = await checkList(tx, actor.clinicId, text, now);
  return {
    rows: checked.map(({ row, lead, errors, alreadyEnrolled }) => ({
      line: row.line,
      name: row.cells.name.trim(),
      chartNumber: row.cells.chart_number.trim(),
      surgeryDate: row.cells.surgery_date.trim(),
      lead,
      errors,
      alreadyEnrolled,
    })),
    problems,
    ready: checked.filter(({ patient }) => patient !== null).length,
  };
};

/** Enrols every row, or none where one is not right. Who is enrolled already is left out. */
export const importList = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { text, invite }: { text: string; invite: 'email' | 'not-yet' },
  now: Date,
): Promise<{ enrolled: number; alreadyEnrolled: number }> => {
  await holdTurn(tx, actor.clinicId, 'address-is-taken');
  const { problems, around, checked } = await checkList(tx, actor.clinicId, text, now);
  const errors = [
    ...problems.map((message) => ({ field: 'text', message })),
    ...checked.flatMap(({ row, errors: inRow }) =>
      inRow.map(({ column, message }) => ({ field: `rows.${row.line}.${column}`, message })),
    ),
  ];
  if (errors.length > 0)
    throw new Problem('invalid-input', 'Nobody was enrolled: the list is not right.', { errors });
  const patients = checked.flatMap(({ patient }) => (patient ? [patient] : []));
  const { country } = around;
  for (const { consent, ...fields } of patients) {
    const id = randomUUID();
    await writePatient(tx, site, actor, { id, invite, consent, country, ...asKept(fields, country) }, now);
  }
  return { enrolled: patients.length, alreadyEnrolled: checked.filter((one) => one.alreadyEnrolled).length };
};
