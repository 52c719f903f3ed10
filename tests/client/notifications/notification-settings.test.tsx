import { screen, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, describe, expect, it } from 'vitest';
import type { NotificationSettings } from '#shared/notifications/contract.ts';
import { kindRules } from '#shared/notifications/kinds.ts';
import { Problem } from '#shared/problems/problems.ts';
import { NotificationScreen } from '#src/features/notifications/NotificationScreen.tsx';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import words from '#src/locales/en/notifications.json';
import { inesHerself } from '../app/caring-people.ts';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';

const user = userEvent.setup({ delay: null });

const settings = (part: Partial<NotificationSettings> = {}): NotificationSettings => ({
  choices: [
    { kind: 'new-message', channel: 'email', enabled: true, locked: false },
    { kind: 'new-message', channel: 'sms', enabled: false, locked: false },
    { kind: 'check-in-reminder', channel: 'email', enabled: true, locked: false },
  ],
  missing: [],
  phone: null,
  email: 'ines.valcourt@mail.example',
  emailBounced: false,
  timeZone: 'America/New_York',
  quietFrom: '21:00',
  quietUntil: '07:00',
  remindAt: '10:00',
  ...part,
});

async function show(now = settings(), routes: Record<string, Answer> = {}, me = inesHerself()) {
  await startI18n();
  await loadWords(['account', 'notifications']);
  const sent = serve({
    'GET /api/notification-settings': () => now,
    'GET /api/push-subscriptions': () => ({ subscriptions: [] }),
    ...routes,
  });
  await showTo(me, <NotificationScreen />);
  await screen.findByRole('button', { name: 'Save' });
  return sent;
}
const press = (name: string | RegExp) => user.click(screen.getByRole('button', { name }));

beforeEach(() => localStorage.clear());

describe('how somebody is reached', () => {
  it('is saved as a whole: kinds by ways, quiet hours with their zone, the number, the reminder', async () => {
    const kept = settings({ phone: '+12125550142' });
    const sent = await show(settings(), { 'PUT /api/notification-settings': () => kept });
    const messages = screen.getByRole('group', { name: 'A new message' });
    expect(within(messages).getByRole('checkbox', { name: 'A text message' })).toHaveProperty(
      'checked',
      false,
    );
    expect(messages.textContent).toContain('For this we need your number');
    await user.click(within(messages).getByRole('checkbox', { name: 'A text message' }));
    await user.type(screen.getByLabelText('Phone number'), '212 555 0142');
    await user.clear(screen.getByLabelText('Remind me at'));
    await press('Save');
    expect(await screen.findByText('Saved.')).toBeDefined();
    expect(sent.find(({ method }) => method === 'PUT')?.body).toEqual({
      choices: [
        { kind: 'new-message', channel: 'email', enabled: true },
        { kind: 'new-message', channel: 'sms', enabled: true },
        { kind: 'check-in-reminder', channel: 'email', enabled: true },
      ],
      phone: '212 555 0142',
      timeZone: 'America/New_York',
      quietFrom: '21:00',
      quietUntil: '07:00',
      remindAt: null,
    });
  });

  it('says beside the field what is no time zone, no pair of hours and no number, and keeps what was typed', async () => {
    const sent = await show(settings(), {
      'PUT /api/notification-settings': () =>
        new Problem('invalid-input', undefined, {
          errors: [{ field: 'phone', message: 'That is no telephone number.' }],
        }),
    });
    await user.clear(screen.getByLabelText('Time zone'));
    await user.type(screen.getByLabelText('Time zone'), 'Mars/Base');
    await user.clear(screen.getByLabelText('Until'));
    await press('Save');
    expect(await screen.findByText(/That is not a time zone/)).toBeDefined();
    expect(screen.getByText('Give both times, or neither.')).toBeDefined();
    expect(sent.some(({ method }) => method === 'PUT')).toBe(false);
    await user.clear(screen.getByLabelText('Time zone'));
    await user.type(screen.getByLabelText('Time zone'), 'America/Chicago');
    await user.clear(screen.getByLabelText('From'));
    await user.type(screen.getByLabelText('Phone number'), 'twelve');
    await press('Save');
    expect(await screen.findByText('That is no telephone number.')).toBeDefined();
    expect(screen.getByLabelText('Phone number')).toHaveProperty('value', 'twelve');
  });

  it('cannot be turned off where it must reach a clinician, and says why', async () => {
    const locked = { kind: 'new-emergency', channel: 'phone', enabled: true, locked: true } as const;
    await show(settings({ choices: [locked], phone: '+12125550142', missing: ['push'] }), {}, noorSignedIn);
    const box = screen.getByRole('checkbox', { name: 'A phone call' });
    expect(box).toHaveProperty('disabled', true);
    expect(screen.getByText(/at least one way must be able to wake you/)).toBeDefined();
    expect(screen.queryByLabelText('Remind me at')).toBeNull();
    expect(screen.getByText('We cannot wake you yet')).toBeDefined();
    expect(screen.getByText(/Turn notices on, on a device that is near you/)).toBeDefined();
  });

  it('says that mail came back, and sends a test by each way that has somewhere to go', async () => {
    const sent = await show(settings({ emailBounced: true }), {
      'POST /api/notification-tests': () => undefined,
    });
    expect(screen.getByText('Our mail to you came back')).toBeDefined();
    expect(screen.queryByRole('button', { name: 'Send a test text' })).toBeNull();
    await press('Send a test e-mail');
    expect(await screen.findByText(/A test e-mail is on its way/)).toBeDefined();
    expect(sent.at(-1)?.body).toEqual({ channel: 'email' });
  });

  it('names the devices, each with a test and a way to remove it', async () => {
    const device = {
      id: 'sub-1',
      deviceName: 'Firefox on Linux',
      createdAt: '2026-11-20T09:00:00.000Z',
      lastSentAt: null,
      current: false,
    };
    let subscriptions = [device];
    const sent = await show(settings(), {
      'GET /api/push-subscriptions': () => ({ subscriptions }),
      'POST /api/push-subscriptions/sub-1/test': () => undefined,
      'DELETE /api/push-subscriptions/sub-1': () => {
        subscriptions = [];
      },
    });
    await user.click(await screen.findByRole('button', { name: 'Send a test to Firefox on Linux' }));
    expect(await screen.findByText(/A test is on its way/)).toBeDefined();
    await press('Remove Firefox on Linux');
    await screen.findByRole('heading', { name: 'Notices on this device' });
    expect(sent.map(({ method }) => method)).toContain('DELETE');
  });

  it('says plainly where this browser cannot be woken, and asks for nothing', async () => {
    await show();
    // jsdom has neither a service worker nor push.
    expect(await screen.findByText('This browser cannot show notices')).toBeDefined();
  });

  it('has words for every kind that somebody may choose', () => {
    const chosen = Object.entries(kindRules).filter(([, { chosenBy }]) => chosenBy.length > 0);
    expect(chosen.map(([kind]) => kind).sort()).toEqual(Object.keys(words.kinds).sort());
  });
});
