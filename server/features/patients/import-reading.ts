import Papa from 'papaparse';
import { z } from 'zod';
import { importColumns, importLimits } from '#shared/patients/import-contract.ts';
import { consentFields, identityFields, operationCardFields } from '#shared/patients/record.ts';

type Column = (typeof importColumns)[number];
export type CellError = { column: string; message: string };
type Cells = Record<Column, string>;

/** Facts that may be left out of a list: nobody has asked. */
const optionalColumns: readonly Column[] = [
  'blood_thinner',
  'allergies',
  'main_medicines',
  'equipment_at_home',
  'tuberosity',
  'limits',
];

const rowSchema = z.object({
  identity: z.object(identityFields),
  operation: z.object(operationCardFields),
  consent: consentFields,
});
type ImportFields = z.output<typeof rowSchema>;

export type ImportRow = {
  /** The line in what was pasted; the header is line 1. */
  line: number;
  cells: Cells;
  /** Null where the form would not take it. */
  fields: ImportFields | null;
  errors: CellError[];
};

const columnOf = (header: string): string =>
  header
    .trim()
    .toLowerCase()
    .replace(/[\s-]+/g, '_');

const isColumn = (name: string): name is Column => (importColumns as readonly string[]).includes(name);

/** Which column a path of the record came from: `identity.birthDate` from `birth_date`. */
export const columnOfPath = (path: string): string => {
  if (path === 'careTeam') return 'lead_email';
  const [part = '', field = part] = path.split('.');
  if (part === 'consent') return `consent_${field}`;
  return field.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
};

/** A choice as people write it in a sheet: "Reverse replacement" is reverse-replacement. */
const choice = (text: string): string =>
  text
    .trim()
    .toLowerCase()
    .replace(/[\s_]+/g, '-');

/** The cells as the form's fields; whatever is not right is for the form's own schemas to say. */
const toFields = (cells: Cells) => ({
  identity: {
    name: cells.name,
    email: cells.email,
    chartNumber: cells.chart_number,
    birthDate: cells.birth_date.trim(),
    phone: cells.phone,
    address: cells.address,
    timeZone: cells.time_zone.trim(),
    language: cells.language,
    dominantHand: choice(cells.dominant_hand),
    emergencyContact: cells.emergency_contact,
    bloodThinner: cells.blood_thinner,
    allergies: cells.allergies,
    mainMedicines: cells.main_medicines,
    equipmentAtHome: cells.equipment_at_home,
  },
  operation: {
    procedure: choice(cells.procedure),
    arm: choice(cells.arm),
    surgeryDate: cells.surgery_date.trim(),
    surgeon: cells.surgeon,
    approach: choice(cells.approach),
    subscapularis: choice(cells.subscapularis),
    biceps: choice(cells.biceps),
    tuberosity: cells.tuberosity,
    limits: cells.limits,
    block: choice(cells.block),
    dressingUntilDay: /^\s*-?\d+\s*$/.test(cells.dressing_until_day)
      ? Number(cells.dressing_until_day)
      : undefined,
  },
  consent: { on: cells.consent_on.trim(), how: choice(cells.consent_how) },
});

const dateColumns: readonly Column[] = ['birth_date', 'surgery_date', 'consent_on'];

/** 03/04/2026 is two days, depending on who reads it: no such date is guessed. */
const toCellError = ({ column, message }: CellError, cells: Cells): CellError => {
  const isWritten = isColumn(column) && dateColumns.includes(column) && cells[column].trim() !== '';
  return isWritten ? { column, message: 'Write dates as 2026-03-04.' } : { column, message };
};

const readRow = (line: number, cells: Cells): ImportRow => {
  const parsed = rowSchema.safeParse(toFields(cells));
  if (parsed.success) return { line, cells, fields: parsed.data, errors: [] };
  const errors = parsed.error.issues.map(({ path, message }) =>
    toCellError({ column: columnOfPath(path.join('.')), message }, cells),
  );
  return { line, cells, fields: null, errors };
};

const headerProblems = (header: readonly string[]): string[] => {
  const problems: string[] = [];
  header.forEach((name, index) => {
    if (name === '') problems.push(`Column ${index + 1} has no name.`);
    else if (!isColumn(name)) problems.push(`The column "${name}" is not known.`);
    else if (header.indexOf(name) !== index) problems.push(`The column "${name}" is there twice.`);
  });
  for (const name of importColumns) {
    if (!header.includes(name) && !optionalColumns.includes(name)) {
      problems.push(`The column "${name}" is missing.`);
    }
  }
  return problems;
};

/** The line on which each record begins: a quoted cell may hold line breaks. */
const linesOf = (records: readonly string[][]): number[] => {
  let next = 1;
  return records.map((record) => {
    const line = next;
    next += 1 + record.reduce((breaks, cell) => breaks + (cell.match(/\r\n|\r|\n/g)?.length ?? 0), 0);
    return line;
  });
};

/**
 * Reads a pasted list: separated by commas, semicolons or tabs, with or without a byte order mark, quoted cells and
 * either kind of line end. Cells are text, whatever they begin with.
 */
export const readList = (text: string): { rows: ImportRow[]; problems: string[] } => {
  const { data, errors } = Papa.parse<string[]>(text.replace(/^\uFEFF/, ''), {
    delimitersToGuess: [',', ';', '\t'],
  });
  const lines = linesOf(data);
  const [first = [], ...others] = data;
  const header = first.map(columnOf);
  const problems = headerProblems(header);
  for (const { code, row } of errors) {
    if (code === 'UndetectableDelimiter') continue;
    problems.push(`Line ${lines[row ?? 0] ?? 1}: a quotation mark is not closed.`);
  }
  const records = others
    .map((cells, index) => ({ cells, line: lines[index + 1] ?? 0 }))
    .filter(({ cells }) => cells.some((cell) => cell.trim() !== ''));
  if (records.length === 0) problems.push('There is no row below the column names.');
  if (records.length > importLimits.rows) {
    problems.push(`These are ${records.length} rows: ${importLimits.rows} at most. Enrol them in parts.`);
  }
  if (problems.length > 0) return { rows: [], problems };
  const rows = records.map(({ cells, line }) => {
    const named = importColumns.map((name) => [name, cells[header.indexOf(name)] ?? '']);
    const row = readRow(line, Object.fromEntries(named) as Cells);
    const extra = cells.slice(header.length).some((cell) => cell.trim() !== '');
    return extra
      ? {
          ...row,
          errors: [...row.errors, { column: '', message: 'This row has more cells than there are columns.' }],
        }
      : row;
  });
  return { rows, problems: [] };
};
