import type { FlagCase, FlagRow } from '#shared/triage/contract.ts';

export const flagId = '3c9d2b7a-1f4e-4f6b-9a0d-5e2c7b8f1a01';
export const noor = { personId: '7a4d6f0e-0f38-4a5f-a1a5-0d5b3f2c9e31', name: 'Noor Haddad' };
export const callum = { personId: '8b5e7f1f-1a49-4b6a-b2b6-1e6c4a3d0f42', name: 'Callum Reyes' };

export function aRow(given: Partial<FlagRow> = {}): FlagRow {
  return {
    id: flagId,
    state: 'open',
    urgency: 'urgent',
    patient: {
      id: '5f1f3d1c-7a5e-4f4e-8a52-8c1d3e5f7a91',
      name: 'Tobias Ahlgren',
      day: 31,
      arm: 'right',
      procedure: 'reverse-replacement',
    },
    headline: 'Fall with injury',
    raisedAt: '2026-12-01T06:50:00.000Z',
    claimedBy: null,
    claimedAt: null,
    calledMistakeAt: null,
    pain14: [3, 3, null, 3, 8],
    usualPain: 3,
    ...given,
  };
}

export function aCase(given: Partial<FlagCase> = {}): FlagCase {
  return {
    ...aRow(),
    reasons: [
      {
        code: 'fall-with-injury',
        ruleVersion: 1,
        urgency: 'urgent',
        title: 'Fall with injury',
        sentence: 'A fall, and pain is 8, which is 5 above the usual 3.',
        source: 'Default of ours (D)',
      },
    ],
    person: {
      age: 74,
      phone: '555-0142',
      surgeon: 'Dr. Mbeki-Stone',
      phase: 'Protect',
      emergencyContact: 'Greta Ahlgren, 555-0143',
      bloodThinner: 'apixaban',
      allergies: null,
      chartNumber: 'OL-1031',
      language: 'English',
    },
    beside: [{ label: 'Pain now', today: '8', usual: '3', days14: [3, 3, null, 3, 8] }],
    answeredAt: '2026-12-01T06:49:00.000Z',
    note: null,
    inForce: [],
    events: [
      { id: 'e1', kind: 'raised', at: '2026-12-01T06:50:00.000Z', by: null, detail: null, note: null },
    ],
    earlier: [],
    threadId: null,
    outcome: null,
    ...given,
  };
}
