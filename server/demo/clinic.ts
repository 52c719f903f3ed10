import type { clinics } from '../db/schema/clinics.ts';

/** Fixed, so that the demo clinic is found again, and no other can be taken for it. */
export const demoClinicId = '5b0f6a52-3c1e-4d7a-9b6e-0d2f4c8a1e37';

/** The clinic's zone and that of all its patients. */
export const demoTimeZone = 'America/New_York';

export const surgeon = 'Dr. Mbeki-Stone';

/** Orchard Lane is invented, its telephone numbers lie in the reserved block 555-01xx. */
export const demoClinic: typeof clinics.$inferSelect = {
  id: demoClinicId,
  name: 'Orchard Lane Shoulder Clinic',
  timeZone: demoTimeZone,
  emergencyNumber: '911',
  crisisNumber: '988',
  onCallNumber: '518-555-0111',
  phone: '518-555-0100',
  openingHours: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, opens: '08:00', closes: '18:00' })),
  country: 'US',
  isDemo: true,
};
