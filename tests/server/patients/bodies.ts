import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import { addDays } from '#shared/plans/calendar.ts';
import { type enrolPatientBody } from '#shared/patients/contract.ts';
import { importColumns } from '#shared/patients/import-contract.ts';
import type { TestPerson } from '#tests/support/clinic.ts';

type EnrolBody = z.input<typeof enrolPatientBody>;

const today = () => new Date().toISOString().slice(0, 10);

type Changes = {
  id?: string;
  identity?: Partial<EnrolBody['identity']>;
  operation?: Partial<EnrolBody['operation']>;
  careTeam?: EnrolBody['careTeam'];
  consent?: EnrolBody['consent'];
  invite?: EnrolBody['invite'];
};

/** A patient as the form sends one, five days after surgery, with the lead as the whole care team. */
export const enrolBody = (lead: TestPerson, changes: Changes = {}): EnrolBody => {
  const id = changes.id ?? randomUUID();
  return {
    id,
    identity: {
      name: 'Ada Lindqvist-Moreau',
      email: `${id}@patients.example`,
      chartNumber: `E-${id.slice(0, 8)}`,
      birthDate: '1951-02-28',
      phone: '(518) 555-0142',
      address: '4 Quince Lane, Larkmoor',
      timeZone: 'America/New_York',
      language: 'English',
      dominantHand: 'right',
      emergencyContact: 'Bas (son), 518-555-0143',
      bloodThinner: 'none',
      allergies: null,
      mainMedicines: null,
      equipmentAtHome: null,
      ...changes.identity,
    },
    operation: {
      procedure: 'reverse-replacement',
      arm: 'left',
      surgeryDate: addDays(today(), -5),
      surgeon: 'Dr. Mbeki-Stone',
      approach: 'deltopectoral',
      subscapularis: 'repaired',
      biceps: 'tenodesis',
      tuberosity: null,
      limits: null,
      block: 'single',
      dressingUntilDay: 10,
      ...changes.operation,
    },
    careTeam: changes.careTeam ?? [{ personId: lead.personId, isLead: true }],
    consent: changes.consent ?? { on: addDays(today(), -9), how: 'signed' },
    invite: changes.invite ?? 'not-yet',
  };
};

type Cells = Partial<Record<(typeof importColumns)[number], string>>;

/** The cells of one row of a list, all right. */
export const rowOf = (
  lead: TestPerson,
  changes: Cells = {},
): Record<(typeof importColumns)[number], string> => {
  const key = randomUUID().slice(0, 8);
  return {
    name: 'Ada Lindqvist-Moreau',
    email: `${key}@patients.example`,
    chart_number: `I-${key}`,
    birth_date: '1951-02-28',
    phone: '518-555-0142',
    address: '4 Quince Lane, Larkmoor',
    time_zone: 'America/New_York',
    language: 'English',
    dominant_hand: 'right',
    emergency_contact: 'Bas (son), 518-555-0143',
    blood_thinner: 'none',
    allergies: '',
    main_medicines: '',
    equipment_at_home: '',
    procedure: 'reverse-replacement',
    arm: 'left',
    surgery_date: addDays(today(), -5),
    surgeon: 'Dr. Mbeki-Stone',
    approach: 'deltopectoral',
    subscapularis: 'repaired',
    biceps: 'tenodesis',
    tuberosity: '',
    limits: '',
    block: 'single',
    dressing_until_day: '10',
    lead_email: lead.email,
    consent_on: addDays(today(), -9),
    consent_how: 'signed',
    ...changes,
  };
};

type ListForm = { separator?: string; lineEnd?: string; columns?: readonly string[] };

/** Rows as a pasted list; every cell in quotation marks, as RFC 4180 lets any cell be. */
export const listOf = (
  rows: Record<string, string>[],
  { separator = ',', lineEnd = '\n', columns = importColumns }: ListForm = {},
): string => {
  const quoted = (cell: string) => `"${cell.replaceAll('"', '""')}"`;
  const lines = rows.map((row) => columns.map((name) => quoted(row[name] ?? '')).join(separator));
  return [columns.join(separator), ...lines].join(lineEnd);
};
