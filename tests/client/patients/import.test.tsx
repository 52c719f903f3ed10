import { fireEvent, screen } from '@testing-library/react';
import { expect, it, vi } from 'vitest';
import type { ImportPreview } from '#shared/patients/import-contract.ts';
import { ImportForm } from '#src/features/patients/ImportForm.tsx';
import { lost, noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';

const row = (line: number, changes: Partial<ImportPreview['rows'][number]> = {}) => ({
  line,
  name: `Patient ${line}`,
  chartNumber: `OL-${line}`,
  surgeryDate: '2026-11-20',
  lead: 'Noor Haddad',
  errors: [],
  alreadyEnrolled: false,
  ...changes,
});

const good: ImportPreview = {
  rows: [row(2), row(3), row(4, { alreadyEnrolled: true })],
  problems: [],
  ready: 2,
};
const bad: ImportPreview = {
  rows: [row(2), row(3, { errors: [{ column: 'birth_date', message: 'Enter the date of birth.' }] })],
  problems: [],
  ready: 1,
};

async function show(preview: Answer, enrol: Answer = () => ({ enrolled: 2, alreadyEnrolled: 1 })) {
  const sent = serve({
    'POST /api/patient-imports/preview': preview,
    'POST /api/patient-imports': enrol,
  });
  const onEnrolled = vi.fn();
  await showTo(noorSignedIn, <ImportForm onEnrolled={onEnrolled} />);
  return { sent, onEnrolled };
}
const list = () => screen.getByLabelText<HTMLTextAreaElement>('The list');
const paste = (text: string) => fireEvent.change(list(), { target: { value: text } });
const look = () => fireEvent.click(screen.getByRole('button', { name: /^Look/u }));

it('says what would happen, by line and column, and enrols nobody while one row is not right', async () => {
  const { sent } = await show(() => bad);
  paste('name\tbirth_date\nA\t1957-03-09\nB\t');
  look();
  expect(await screen.findByText('1 ready, 1 with errors')).toBeTruthy();
  const wrong = screen.getByText('Enter the date of birth.').closest('tr');
  expect(wrong?.textContent).toContain('Line 3');
  expect(wrong?.textContent).toContain('Enter the date of birth.');
  expect(screen.queryByRole('button', { name: /^Enrol/u })).toBeNull();
  expect(screen.getByText(/All or nobody is enrolled/u)).toBeTruthy();

  fireEvent.click(screen.getByLabelText('Only rows with errors'));
  expect(screen.queryByText('Patient 2')).toBeNull();
  expect(sent.map(({ path }) => path)).toEqual(['/api/patient-imports/preview']);
});

it('enrols what was looked at, once it is said how they are invited', async () => {
  const { sent, onEnrolled } = await show(() => good);
  paste('name\nA\nB\nC');
  look();
  expect(await screen.findByText('2 ready, 1 already enrolled')).toBeTruthy();
  const enrol = screen.getByRole('button', { name: 'Enrol all 2 patients' });
  fireEvent.click(enrol);
  expect(screen.getByText('Choose how they are invited.')).toBeTruthy();
  fireEvent.click(screen.getByLabelText('By e-mail, now'));
  fireEvent.click(enrol);
  await vi.waitFor(() => expect(onEnrolled).toHaveBeenCalledWith(2, 1));
  expect(sent.at(-1)).toMatchObject({
    path: '/api/patient-imports',
    body: { text: 'name\nA\nB\nC', invite: 'email' },
  });
});

it('wants a list that has changed to be looked at again before anybody is enrolled', async () => {
  await show(() => good);
  paste('name\nA');
  look();
  await screen.findByRole('button', { name: 'Enrol all 2 patients' });
  paste('name\nA\nB');
  expect(screen.queryByRole('button', { name: /^Enrol/u })).toBeNull();
  expect(screen.getByText(/The list has changed/u)).toBeTruthy();
});

it('keeps the list when the server does not answer', async () => {
  await show(
    () => good,
    () => lost,
  );
  paste('name\nA\nB');
  look();
  await screen.findByText('2 ready, 1 already enrolled');
  fireEvent.click(screen.getByLabelText(/^Not yet/u));
  fireEvent.click(screen.getByRole('button', { name: 'Enrol all 2 patients' }));
  expect(await screen.findByText('The server did not answer.')).toBeTruthy();
  expect(list().value).toBe('name\nA\nB');
});

it('asks for a list before anything is sent', async () => {
  const { sent } = await show(() => good);
  look();
  expect(await screen.findByText('Paste the list first.')).toBeTruthy();
  expect(sent).toEqual([]);
});
