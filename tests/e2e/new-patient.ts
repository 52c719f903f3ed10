import { randomUUID } from 'node:crypto';
import type { Page } from '@playwright/test';
import { demoTimeZone } from '#server/demo/clinic.ts';
import { staffId } from '#server/demo/staff.ts';
import type { EnrolPatient, enrolPatient } from '#shared/patients/contract.ts';
import { addDays, localDateIn } from '#shared/plans/calendar.ts';
import type { Product } from '#tests/support/product.ts';
import { callAs } from './own-session.ts';

/** Noor enrols somebody who was operated on three days ago. */
export const enrol = async (
  noor: Page,
  product: Product,
  { name, email, invite }: { name: string; email: string; invite: EnrolPatient['invite'] },
) => {
  const today = localDateIn(demoTimeZone, new Date());
  const { invitation } = await callAs<typeof enrolPatient>(noor, product, 'post', '/api/patients', {
    body: {
      id: randomUUID(),
      identity: {
        name,
        email,
        chartNumber: `E-${email}`,
        birthDate: '1952-03-14',
        phone: '518-555-0190',
        address: '4 Hazel Row',
        timeZone: demoTimeZone,
        language: 'English',
        dominantHand: 'right',
        emergencyContact: 'A neighbor, 518-555-0191',
        bloodThinner: 'none',
        allergies: null,
        mainMedicines: null,
        equipmentAtHome: null,
      },
      operation: {
        procedure: 'reverse-replacement',
        arm: 'left',
        surgeryDate: addDays(today, -3),
        surgeon: 'Dr. Mbeki-Stone',
        approach: 'deltopectoral',
        subscapularis: 'repaired',
        biceps: 'tenodesis',
        tuberosity: null,
        limits: null,
        block: 'single',
        dressingUntilDay: 14,
      },
      careTeam: [{ personId: staffId('noor'), isLead: true }],
      consent: { on: today, how: 'signed' },
      invite,
    },
  });
  return { email, invitationId: invitation?.id ?? '' };
};
