import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import type { Delivery } from '#shared/notifications/contract.ts';
import { failureOf } from '#src/features/deliveries/words.ts';
import { DeliveriesPage } from '#src/pages/DeliveriesPage.tsx';
import { serve, showTo } from '../clinic/screen.tsx';
import { admin } from '../people/staff.ts';

const user = userEvent.setup({ delay: null });

const failed: Delivery = {
  id: '6f7a8b9c-0d1e-4f2a-8b3c-4d5e6f7a8b9c',
  person: { id: '7a8b9c0d-1e2f-4a3b-8c4d-5e6f7a8b9c0d', name: 'Tobias Ahlgren' },
  channel: 'email',
  kind: 'invitation',
  state: 'bounced',
  attempts: 1,
  lastError: 'bounced',
  createdAt: '2026-12-01T09:00:00.000Z',
  dueAt: '2026-12-01T09:00:00.000Z',
  sentAt: null,
  outcome: null,
  acknowledgedAt: null,
};

it('says what came back, to whom and why, and sends it again', async () => {
  let again = false;
  const sent = serve({
    'GET /api/deliveries': () =>
      again ? { failed: [], late: [], recent: [] } : { failed: [failed], late: [], recent: [failed] },
    [`POST /api/deliveries/${failed.id}/again`]: () => {
      again = true;
      return { ...failed, state: 'pending' };
    },
  });
  await showTo(admin, <DeliveriesPage />, { at: '/clinic/deliveries' });
  expect(await screen.findByText('The address refuses mail. Check it with the person.')).toBeTruthy();
  // It is among the newest as well, and stands on the page once.
  expect(
    screen.getAllByRole('listitem').filter(({ textContent }) => textContent.includes('Tobias')),
  ).toHaveLength(1);
  await user.click(screen.getByRole('button', { name: 'Send again: Invitation to Tobias Ahlgren' }));
  expect(await screen.findByText('It is on its way again to Tobias Ahlgren.')).toBeTruthy();
  expect(await screen.findByText('Everything got through.')).toBeTruthy();
  expect(sent.filter(({ method }) => method === 'POST')).toHaveLength(1);
});

it.each([
  ['ECONNREFUSED', 'The gateway could not be reached (ECONNREFUSED).'],
  ['no-answer', 'Nobody answered the call.'],
  ['something-new', 'It could not be sent (something-new).'],
])('puts the code %s into words', (lastError, words) => {
  expect(failureOf({ lastError })).toBe(words);
});
