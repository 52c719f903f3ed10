import { randomUUID } from 'node:crypto';
import { importColumns } from '#shared/patients/import-contract.ts';
import type { TestPerson } from '#tests/support/clinic.ts';
import { enrolBody } from '../server/patients/bodies.ts';
import type { ProcessBrowser } from '../faults/processes.ts';

type Call = ProcessBrowser['call'];

/** A word for each field in which people write about a patient, a caregiver or a colleague. */
const identity = {
  name: 'Philomena Applethwaite',
  chartNumber: 'Xylo-77',
  address: '3 Gooseberry Row',
  language: 'Volapuk',
  emergencyContact: 'Bartleby, 518-555-0143',
  bloodThinner: 'quinoxaline',
  allergies: 'tamarind',
  mainMedicines: 'wormwood drops',
  equipmentAtHome: 'a unicycle',
};
const operation = { surgeon: 'Dr. Snodgrass', limits: 'no pirouettes', tuberosity: 'meringue' };
const caregiver = {
  name: 'Wilhelmina Thistlewood',
  relationship: 'Godmother',
  mayCheckIn: true,
  mayMessage: true,
  until: null,
};
const consent = 'Agreed by candlelight.';
const colleague = { name: 'Octavius Plumtree', credential: 'DPT-zither' };
const reasons = {
  pause: 'In the harpsichord ward.',
  opening: 'Heard a tambourine.',
  removal: 'Played the kazoo.',
};

/** Why a colleague's rights changed is kept in the audit itself, for whoever looks into it later. */
export const keptInAudit = ['kazoo'];

export const formCanaries = [
  ...['Philomena', 'Applethwaite', 'Xylo', 'Gooseberry', 'Volapuk', 'Bartleby', 'quinoxaline', 'tamarind'],
  ...['wormwood', 'unicycle', 'Snodgrass', 'pirouette', 'meringue', 'Wilhelmina', 'Thistlewood', 'Godmother'],
  ...['candlelight', 'Octavius', 'Plumtree', 'zither', 'harpsichord', 'tambourine'],
  ...keptInAudit,
];

type Hands = {
  /** A therapist, the administrator, and a patient, each signed in. */
  desk: Call;
  office: Call;
  phone: Call;
  lead: TestPerson;
  /** A patient on nobody's care team. */
  strangerId: string;
};

const expectStatus = async (status: number, answer: ReturnType<Call>): Promise<string> => {
  const { status: got, text } = await answer;
  if (got !== status) throw new Error(`Expected ${status}, got ${got}: ${text}`);
  return text;
};

const email = () => `${randomUUID()}@people.example`;

/** Fills every form with words that stand nowhere else: once as it should be, and then in every way that is refused. */
export const fillForms = async ({ desk, office, phone, lead, strangerId }: Hands): Promise<void> => {
  const enrolment = enrolBody(lead, { identity, operation, invite: 'email' });
  const record = await expectStatus(201, desk('post', '/api/patients', enrolment));
  const { id } = JSON.parse(record) as { id: string };
  const patient = `/api/patients/${id}`;
  await expectStatus(201, desk('post', `${patient}/invitations`, { byEmail: true }));
  const invited = { id: randomUUID(), email: email(), ...caregiver };
  await expectStatus(201, desk('post', `${patient}/caregivers`, { ...invited, byEmail: true, consent }));
  await expectStatus(
    201,
    phone('post', '/api/caregivers', { id: randomUUID(), email: email(), ...caregiver }),
  );
  await expectStatus(204, desk('post', `/api/patients/${strangerId}/openings`, { reason: reasons.opening }));
  await expectStatus(200, desk('post', `${patient}/moves`, { move: 'pause', reason: reasons.pause }));
  await expectStatus(200, desk('post', `${patient}/moves`, { move: 'discharge', reason: reasons.pause }));
  const staff = {
    id: randomUUID(),
    email: email(),
    phone: null,
    timeZone: null,
    roles: ['therapist'],
    ...colleague,
  };
  const added = await expectStatus(201, office('post', '/api/people', staff));
  const person = `/api/people/${(JSON.parse(added) as { id: string }).id}`;
  await expectStatus(
    200,
    office('post', `${person}/roles`, { role: 'administrator', reason: reasons.removal }),
  );
  await expectStatus(200, office('post', `${person}/deactivation`, { reason: reasons.removal }));

  const refuse = (call: Call, path: string, body: unknown, method: 'post' | 'put' = 'post') =>
    expectStatus(422, call(method, path, body));
  await refuse(desk, '/api/patients', enrolBody(lead, { identity: { ...identity, phone: 'call Bartleby' } }));
  await refuse(
    desk,
    '/api/patients',
    enrolBody(lead, { identity: { ...identity, timeZone: 'Mars/Gooseberry' } }),
  );
  await refuse(desk, '/api/patients', enrolBody(lead, { operation: { surgeon: 'Snodgrass'.repeat(20) } }));
  const row = importColumns.map((column) => (column === 'name' ? identity.name : 'wormwood')).join(',');
  await refuse(desk, '/api/patient-imports', { text: `${importColumns.join(',')}\n${row}`, invite: 'email' });
  await refuse(phone, '/api/caregivers', { ...caregiver, id: randomUUID(), email: 'not Wilhelmina' });
  await refuse(office, '/api/people', { ...staff, id: randomUUID(), email: 'Octavius' });
  const settings = {
    phone: 'Bartleby',
    timeZone: 'Etc/UTC',
    quietFrom: null,
    quietUntil: null,
    remindAt: null,
  };
  await refuse(phone, '/api/notification-settings', { choices: [], ...settings }, 'put');
};
