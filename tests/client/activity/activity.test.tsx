import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, expect, it, vi } from 'vitest';
import { activityCodes, coveringReason } from '#shared/caregivers/activity-codes.ts';
import type { ActivityLine } from '#shared/caregivers/contract.ts';
import { byDay } from '#src/features/activity/days.ts';
import words from '#src/locales/en/activity.json';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { ActivityPage } from '#src/pages/ActivityPage.tsx';
import { inesHerself } from '../app/caring-people.ts';
import { serve, showTo } from '../clinic/screen.tsx';

const user = userEvent.setup({ delay: null });

const line = (part: Partial<ActivityLine> = {}): ActivityLine => ({
  id: '1',
  at: '2026-11-28T09:05:00.000Z',
  who: 'Noor Haddad, PT',
  as: 'care-team',
  what: 'opened-record',
  reason: null,
  ...part,
});

beforeEach(async () => {
  await startI18n();
  await loadWords(['account', 'activity']);
});
const show = () => showTo(inesHerself(), <ActivityPage />);

it('says who was there, what they did, and why where they are not on the care team', async () => {
  serve({
    'GET /api/activity': () => ({
      more: false,
      lines: [
        line({ id: '3', who: 'Petra Lindqvist', as: 'clinic', reason: 'Called in while Noor was out.' }),
        line({ id: '2', who: 'Sam Okoro', as: 'clinic', reason: coveringReason }),
        line(),
      ],
    }),
  });
  await show();
  const day = await screen.findByRole('region', { name: 'Saturday 28 Nov' });
  const [petra, sam, noor] = within(day).getAllByRole('listitem');
  expect(petra?.textContent).toContain('the clinic, not on your care team');
  expect(petra?.textContent).toContain('Why: Called in while Noor was out.');
  expect(sam?.textContent).toContain('Why: They stand in for your care team.');
  expect(noor?.textContent).toContain('Opened your record.');
  expect(noor?.textContent).not.toContain('Why');
});

it('fetches older lines on a press, and one’s own when they are asked for', async () => {
  const asked: string[] = [];
  serve({ 'GET /api/activity': () => ({ more: true, lines: [line({ id: String(asked.length) })] }) });
  const known = fetch;
  vi.stubGlobal('fetch', (address: string, init: RequestInit) => {
    asked.push(address);
    return known(address, init);
  });
  await show();
  await user.click(await screen.findByRole('button', { name: 'Show older lines' }));
  await waitFor(() => expect(asked).toHaveLength(2));
  await user.click(screen.getByRole('checkbox', { name: 'Show what I did too' }));
  await waitFor(() => expect(asked).toHaveLength(3));
  expect(asked).toEqual([
    '/api/activity?others=true',
    '/api/activity?others=true&before=2026-11-28T09%3A05%3A00.000Z',
    '/api/activity?others=false',
  ]);
});

it('gathers the lines by day, newest first, each once', () => {
  const lines = [
    line({ id: 'b' }),
    line({ id: 'a' }),
    line({ id: 'a' }),
    line({ id: 'old', at: '2026-11-27T12:00:00.000Z' }),
  ];
  expect(byDay(lines, 'UTC').map(({ date, lines: ofDay }) => [date, ofDay.map(({ id }) => id)])).toEqual([
    ['2026-11-28', ['b', 'a']],
    ['2026-11-27', ['old']],
  ]);
});

it('has words for every code that the server may send', () => {
  expect(Object.keys(words.what).sort()).toEqual([...activityCodes, 'other'].sort());
  expect(Object.keys(words.why)).toEqual([coveringReason]);
});
