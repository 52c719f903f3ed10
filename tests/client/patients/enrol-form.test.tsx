import { fireEvent, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it, vi } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { EnrolPatientForm } from '#src/features/patients/EnrolPatientForm.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { clinicians, record } from './records.ts';

const user = userEvent.setup({ delay: null });

async function show(enrol: Answer = () => record) {
  const sent = serve({
    'GET /api/clinicians': () => ({ clinicians }),
    'POST /api/patients': enrol,
  });
  const onEnrolled = vi.fn();
  await showTo(noorSignedIn, <EnrolPatientForm onEnrolled={onEnrolled} />);
  await screen.findByLabelText('Noor Haddad, PT, DPT');
  return { onEnrolled, bodies: () => sent.filter(({ method }) => method === 'POST').map(({ body }) => body) };
}

const write = async (label: string, text: string) => {
  await user.click(screen.getByLabelText(label));
  await user.paste(text);
};

/**
 * By the name of the control and in one event: asking for forty controls by role, among the hundreds of time
 * zones to choose from, takes this simulated browser many seconds.
 */
function choose(name: string, value: string) {
  const controls = [...document.getElementsByName(name)] as HTMLInputElement[];
  const radio = controls.find((control) => control.type === 'radio' && control.value === value);
  if (radio) fireEvent.click(radio);
  else fireEvent.change(controls[0]!, { target: { value } });
}
const submit = () => fireEvent.click(screen.getByText('Enrol the patient'));

async function fillIn({ thinner }: { thinner: () => Promise<void> | void }) {
  choose('identity.name', 'Tobias Ahlgren');
  choose('identity.chartNumber', 'OL-1042');
  choose('identity.birthDate', '1957-03-09');
  choose('identity.email', 'tobias.ahlgren@mail.example');
  choose('identity.phone', '555-0142');
  choose('identity.address', '12 Mill Lane, Port Ellery');
  choose('identity.language', 'English');
  choose('identity.dominantHand', 'right');
  await thinner();
  choose('identity.emergencyContact', 'Karin Ahlgren, 555-0143');
  choose('operation.procedure', 'reverse-replacement');
  choose('operation.surgeryDate', '2026-11-20');
  choose('operation.arm', 'right');
  choose('operation.surgeon', 'Dr. Mbeki-Stone');
  choose('operation.approach', 'deltopectoral');
  choose('operation.subscapularis', 'repaired');
  choose('operation.biceps', 'tenodesis');
  choose('operation.block', 'single');
  choose('operation.dressingUntilDay', '7');
  fireEvent.click(screen.getByLabelText('Noor Haddad leads'));
  choose('consent.on', '2026-11-12');
  choose('consent.how', 'signed');
  choose('invite', 'letter');
}

const takesNone = () => choose('identity.bloodThinner', 'none');

it('begins with nothing chosen that matters, and with the clinic’s own time zone', async () => {
  await show();
  const boxes = [...document.querySelectorAll<HTMLInputElement>('[type="radio"], [type="checkbox"]')];
  expect(boxes.length).toBeGreaterThan(12);
  expect(boxes.filter(({ checked }) => checked)).toEqual([]);
  const lists = [...document.querySelectorAll('select')].map(({ name, value }) => [name, value]);
  expect(lists).toEqual([
    ['operation.procedure', ''],
    ['operation.approach', ''],
    ['operation.subscapularis', ''],
    ['operation.biceps', ''],
    ['operation.block', ''],
  ]);
  expect(screen.getByLabelText<HTMLInputElement>('Time zone').value).toBe('America/New_York');
});

it('lists everything that is missing with a way to each field, sends nothing, and keeps what was typed', async () => {
  const { bodies } = await show();
  await write('Name', 'Tobias Ahlgren');
  submit();
  const summary = await screen.findByText('The patient is not enrolled yet. Put this right:');
  const links = within(summary.parentElement!).getAllByRole('link');
  const words = links.map((link) => link.textContent);
  expect(words).not.toContain('Enter a name.');
  for (const missing of [
    'Enter the chart number.',
    'Choose: none, which one, or not asked.',
    'Choose the procedure.',
    'Choose the operated arm.',
    'Choose the nerve block.',
    'Enter the day until which the dressing stays.',
    'Choose at least one clinician.',
    'Enter when the patient agreed.',
    'Choose how the patient is invited.',
  ]) {
    expect(words).toContain(missing);
  }
  await user.click(links[words.indexOf('Choose the operated arm.')]!);
  expect(document.activeElement?.getAttribute('name')).toBe('operation.arm');
  expect(screen.getByLabelText<HTMLInputElement>('Name').value).toBe('Tobias Ahlgren');
  expect(bodies()).toEqual([]);
});

it('puts what the server refuses beside its field, keeps the rest, and sends the same id again', async () => {
  const taken = new Problem('invalid-input', undefined, {
    errors: [{ field: 'identity.email', message: 'Somebody of the clinic has this e-mail address already.' }],
  });
  const answers: unknown[] = [taken, record];
  const { bodies, onEnrolled } = await show(() => answers.shift());
  await fillIn({ thinner: takesNone });
  submit();
  const field = await screen.findByLabelText<HTMLInputElement>('E-mail');
  await vi.waitFor(() => expect(field.getAttribute('aria-invalid')).toBe('true'));
  expect(screen.getAllByText('Somebody of the clinic has this e-mail address already.')).toHaveLength(2);
  expect(screen.getByLabelText<HTMLInputElement>('Surgeon').value).toBe('Dr. Mbeki-Stone');
  expect(onEnrolled).not.toHaveBeenCalled();

  choose('identity.email', 'tobias@mail.example');
  submit();
  await vi.waitFor(() => expect(onEnrolled).toHaveBeenCalledWith(record, 'letter'));
  const [first, second] = bodies() as { id: string; identity: { email: string } }[];
  expect(second!.id).toBe(first!.id);
  expect(second!.identity.email).toBe('tobias@mail.example');
  expect(second).toMatchObject({
    identity: { bloodThinner: 'none', allergies: null, timeZone: 'America/New_York' },
    operation: { arm: 'right', dressingUntilDay: 7, tuberosity: null },
    careTeam: [{ personId: clinicians[0]!.personId, isLead: true }],
    consent: { on: '2026-11-12', how: 'signed' },
    invite: 'letter',
  });
});

it.each([
  ['none', takesNone, 'none'],
  ['not asked, which counts as taking one', () => choose('identity.bloodThinner', 'not-asked'), null],
  [
    'one by its name',
    async () => {
      choose('identity.bloodThinner', 'which');
      await write('Which blood thinner?', 'apixaban');
    },
    'apixaban',
  ],
] as const)('keeps the blood thinner apart: %s', async (_words, thinner, expected) => {
  const { bodies, onEnrolled } = await show();
  await fillIn({ thinner });
  submit();
  await vi.waitFor(() => expect(onEnrolled).toHaveBeenCalled());
  expect(bodies()[0]).toMatchObject({ identity: { bloodThinner: expected } });
});

it('does not take "takes one" without a name for "nobody has asked"', async () => {
  const { bodies } = await show();
  await fillIn({ thinner: () => choose('identity.bloodThinner', 'which') });
  submit();
  expect(await screen.findByText('Enter its name.')).toBeTruthy();
  expect(bodies()).toEqual([]);
});
