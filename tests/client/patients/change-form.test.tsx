import { fireEvent, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { EditPatientPage } from '#src/pages/EditPatientPage.tsx';
import { lost, noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { clinicians, record } from './records.ts';

const user = userEvent.setup({ delay: null });
const place = `/api/patients/${record.id}`;
const sentence = 'A colleague changed this record in the meantime. Look at it again before you save.';

const opened: PatientRecord = { ...record, identity: { ...record.identity, bloodThinner: 'none' } };
/** As a colleague has changed it since. */
const present: PatientRecord = {
  ...opened,
  revision: 'as-a-colleague-left-it',
  identity: { ...opened.identity, phone: '+12025550199', bloodThinner: 'apixaban' },
};

async function show(get: Answer, put: Answer) {
  const sent = serve({
    [`GET ${place}`]: get,
    [`PUT ${place}`]: put,
    'GET /api/clinicians': () => ({ clinicians }),
  });
  const { queryClient } = await showTo(noorSignedIn, <EditPatientPage />, {
    at: `/caseload/${record.id}/edit`,
    path: '/caseload/:patientId/edit',
  });
  await screen.findByLabelText('Noor Haddad, PT, DPT');
  const revisions = () =>
    sent.filter(({ method }) => method === 'PUT').map(({ body }) => (body as { revision: string }).revision);
  return { queryClient, revisions };
}

const control = (name: string) => document.getElementsByName(name)[0] as HTMLInputElement;
const thinners = () => [...document.getElementsByName('identity.bloodThinner')] as HTMLInputElement[];
const type = (name: string, value: string) => fireEvent.change(control(name), { target: { value } });
const save = () => user.click(screen.getByText('Save the record'));
const loadPresent = async () => user.click(await screen.findByText('Load the present record'));

it('saves from the revision that it was opened with, whatever is fetched while somebody types', async () => {
  let now = opened;
  const { queryClient, revisions } = await show(
    () => now,
    () => new Problem('state-conflict', sentence),
  );
  type('identity.address', '7 Elm Street');
  now = present;
  await queryClient.refetchQueries();
  expect(control('identity.phone').value).toBe(opened.identity.phone);
  await save();
  await screen.findByText(sentence);
  expect(revisions()).toEqual([opened.revision]);
});

it('keeps what was typed when a colleague was faster, until the present record is asked for', async () => {
  let now = opened;
  const { revisions } = await show(
    () => now,
    () => new Problem('state-conflict', sentence),
  );
  now = present;
  type('identity.address', '7 Elm Street');
  await save();
  const told = await screen.findByText(sentence);
  expect(told.closest('[role="alert"]')).not.toBeNull();
  expect(control('identity.address').value).toBe('7 Elm Street');

  await loadPresent();
  await waitFor(() => expect(control('identity.phone').value).toBe(present.identity.phone));
  expect(control('identity.address').value).toBe(present.identity.address);
  // Also the field that keeps a state of its own: an old "none" here could cost a life.
  expect(thinners().find(({ checked }) => checked)?.value).toBe('which');
  expect(screen.getByLabelText<HTMLInputElement>('Which blood thinner?').value).toBe('apixaban');
  expect(screen.queryByText(sentence)).toBeNull();
  expect(document.activeElement).toBe(control('identity.name'));

  type('identity.address', '7 Elm Street');
  await save();
  await screen.findByText(sentence);
  expect(revisions()).toEqual([opened.revision, present.revision]);
});

it('says that the present record could not be loaded, and keeps what was typed', async () => {
  let reachable = true;
  await show(
    () => (reachable ? opened : lost),
    () => new Problem('state-conflict', sentence),
  );
  type('identity.address', '7 Elm Street');
  await save();
  await screen.findByText(sentence);
  reachable = false;
  await loadPresent();
  expect(await screen.findByText('The present record could not be loaded. Try again.')).toBeTruthy();
  expect(control('identity.address').value).toBe('7 Elm Street');
});
