import { addDays, type LocalDate } from '#shared/plans/calendar.ts';
import type { PlanContent } from '#shared/plans/plan.ts';
import { reverseReplacement } from '#shared/plans/reverse-replacement.ts';
import type { careTeamMembers } from '../db/schema/patients.ts';
import type { people } from '../db/schema/people.ts';
import type { plans, signOffs } from '../db/schema/plans.ts';
import type { Chart } from '../features/plans/queries.ts';
import { demoClinicId, demoTimeZone, surgeon } from './clinic.ts';
import { clock, instantAt, workingDayFrom } from './moments.ts';
import { patientIdOf, personIdOf, patientsOfDemo, type DemoPatient } from './patients.ts';
import { idOf, randomFor, type Random } from './random.ts';
import { staffId } from './staff.ts';

const streets = [
  'Alder Row',
  'Tanner Street',
  'Quince Lane',
  'Weir Road',
  'Old Mill Walk',
  'Cobbler Hill',
] as const;
const towns = ['Larkmoor', 'Tansy Hollow', 'Edderwick', 'Upper Sallow'] as const;
const relatives = [
  'Amara (daughter)',
  'Bas (son)',
  'Cleo (sister)',
  'Davide (brother)',
  'Enid (neighbor)',
  'Farah (daughter)',
  'Goran (son)',
  'Hana (daughter)',
  'Isidro (neighbor)',
  'June (sister)',
] as const;
const medicines = [
  'Acetaminophen; metoprolol',
  'Acetaminophen, oxycodone as needed; lisinopril',
  'Acetaminophen; metformin, atorvastatin',
  'Acetaminophen; levothyroxine',
  'Ibuprofen as needed; amlodipine',
] as const;
const equipment = [
  'Recliner, shower chair',
  'Shower chair, grab bar',
  'Table, hand towel',
  'Large ball, table',
] as const;
const languages: Record<string, string> = {
  'Soledad Quiroga': 'Spanish',
  'Nguyễn Thị Lan Hương': 'Vietnamese',
  'Parvaneh Golestani': 'Persian',
};

/** All the rows of one patient's record, and the same as the chart that the rules read. */
export type PatientRecord = {
  patient: DemoPatient;
  surgeryDate: LocalDate;
  chart: Chart;
  person: typeof people.$inferSelect;
  team: (typeof careTeamMembers.$inferSelect)[];
  plan: typeof plans.$inferSelect;
  signOffs: (typeof signOffs.$inferSelect)[];
};

/** The last two digits of a number in the reserved block 555-01xx; Orchard Lane's own lie below them. */
const numberOf = (patient: DemoPatient): number => 20 + patientsOfDemo.indexOf(patient);

const safetyFactsOf = (patient: DemoPatient, random: Random, today: LocalDate, createdAt: Date) => ({
  clinicId: demoClinicId,
  id: patientIdOf(patient.name),
  personId: personIdOf(patient.name),
  state: 'active' as const,
  chartNumber: `OL-${2400 + numberOf(patient)}`,
  birthDate: addDays(
    `${Number(today.slice(0, 4)) - patient.age - 1}${today.slice(4)}`.replace('-02-29', '-02-28'),
    random.int(2, 360),
  ),
  phone: `518-555-01${numberOf(patient)}`,
  address: `${random.int(2, 180)} ${random.pick(streets)}, ${random.pick(towns)}`,
  timeZone: demoTimeZone,
  language: languages[patient.name] ?? 'English',
  dominantHand: random.chance(0.88) ? ('right' as const) : ('left' as const),
  emergencyContact:
    patient.name === 'Ines Valcourt'
      ? `Teo Valcourt (husband), 838-555-01${numberOf(patient)}`
      : `${random.pick(relatives)}, 838-555-01${numberOf(patient)}`,
  bloodThinner: patient.bloodThinner,
  allergies: patient.allergies,
  mainMedicines: random.chance(0.85) ? random.pick(medicines) : null,
  equipmentAtHome: random.chance(0.8) ? random.pick(equipment) : null,
  consentOn: createdAt.toISOString().slice(0, 10),
  consentHow: 'signed' as const,
  consentBy: staffId(patient.lead),
  createdAt,
});

const cardOf = (patient: DemoPatient, random: Random, surgeryDate: LocalDate) => {
  const subscapularis = random.chance(0.75) ? ('repaired' as const) : ('not-repaired' as const);
  return {
    clinicId: demoClinicId,
    patientId: patientIdOf(patient.name),
    procedure: 'reverse-replacement' as const,
    arm: patient.arm,
    surgeryDate,
    surgeon,
    approach: random.chance(0.9) ? ('deltopectoral' as const) : ('deltoid-split' as const),
    subscapularis,
    biceps: random.chance(0.7) ? ('tenodesis' as const) : ('left' as const),
    tuberosity: null,
    limits:
      subscapularis === 'repaired' && random.chance(0.4) ? 'External rotation to 20° until week 6' : null,
    block: random.pick<Chart['card']['block']>(['single', 'single', 'single', 'long-acting', 'none']),
    dressingUntilDay: random.pick([10, 12, 14]),
  };
};

type Act = { kind: 'open-phase' | 'lift-precaution'; code: string; on: LocalDate };

/**
 * What the therapist has signed off: phases from their usual week on, some days late, and with each phase the
 * precautions that fall due with it. Some people drive later than they might.
 */
const signedBy = (plan: PlanContent, random: Random, surgeryDate: LocalDate, today: LocalDate): Act[] => {
  const inWeek = (week: number): LocalDate =>
    workingDayFrom(addDays(surgeryDate, week * 7 + random.pick([0, 0, 1, 1, 2, 3, 6, 9])));
  const opened = plan.phases.slice(1).map(({ code, usualStartWeek }) => ({
    week: usualStartWeek,
    act: { kind: 'open-phase' as const, code, on: inWeek(usualStartWeek) },
  }));
  const lifted = plan.precautions.map(({ code, liftUsualWeek }) => {
    const on = opened.find(({ week }) => week === liftUsualWeek)?.act.on ?? inWeek(liftUsualWeek);
    const waits = code === 'driving' && random.chance(0.4);
    return { kind: 'lift-precaution' as const, code, on: waits ? workingDayFrom(addDays(on, 14)) : on };
  });
  return [...opened.map(({ act }) => act), ...lifted].filter(({ on }) => on <= today);
};

const teamOf = ({ name, lead, day }: DemoPatient) => {
  const patientId = patientIdOf(name);
  const second = lead === 'noor' ? 'callum' : 'noor';
  const members = [
    { personId: staffId(lead), isLead: true },
    ...(day % 5 === 0 ? [{ personId: staffId(second), isLead: false }] : []),
    ...(day % 4 === 0 ? [{ personId: staffId(day % 8 === 0 ? 'petra' : 'dov'), isLead: false }] : []),
  ];
  return members.map((member) => ({ clinicId: demoClinicId, patientId, ...member }));
};

export const recordOf = (patient: DemoPatient, today: LocalDate): PatientRecord => {
  const random = randomFor('record', patient.name);
  const surgeryDate = addDays(today, -patient.day);
  const enrolledAt = instantAt(workingDayFrom(addDays(surgeryDate, -random.int(9, 20))), clock('10:30'));
  const patientRow = safetyFactsOf(patient, random, today, enrolledAt);
  const content = reverseReplacement;
  const planId = idOf('plan', patient.name);
  const acts = signedBy(content, random, surgeryDate, today);
  return {
    patient,
    surgeryDate,
    person: {
      clinicId: demoClinicId,
      id: personIdOf(patient.name),
      name: patient.name,
      credential: null,
      email: patient.email,
      phone: `+151855501${numberOf(patient)}`,
      timeZone: null,
      quietFrom: '21:00',
      quietUntil: '08:00',
      remindAt: '10:00',
      active: true,
      deactivatedAt: null,
      firstSignedInAt: enrolledAt,
      emailBouncedAt: null,
      createdAt: enrolledAt,
    },
    team: teamOf(patient),
    plan: {
      clinicId: demoClinicId,
      id: planId,
      patientId: patientRow.id,
      protocolCode: content.code,
      protocolVersion: content.version,
      content,
      createdAt: enrolledAt,
    },
    signOffs: acts.map(({ kind, code, on }) => ({
      clinicId: demoClinicId,
      id: idOf('sign-off', patient.name, kind, code),
      planId,
      kind,
      code,
      onDate: on,
      byPersonId: staffId(patient.lead),
    })),
    chart: {
      patient: patientRow,
      name: patient.name,
      card: cardOf(patient, random, surgeryDate),
      plan: content,
      signOffs: acts.map((act) => ({ ...act, by: patient.lead })),
    },
  };
};
