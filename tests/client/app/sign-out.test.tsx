import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { reloadRestoredPages } from '#src/app/restored-page.ts';
import { SignOutButton } from '#src/app/shells/SignOutButton.tsx';
import { listenToOtherTabs } from '#src/app/tabs.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { lost, serve, showTo } from '../clinic/screen.tsx';
import { inesHerself } from './caring-people.ts';

const user = userEvent.setup({ delay: null });

const steps: string[] = [];
const replace = vi.fn((place: string) => steps.push(`page: ${place}`));
const reload = vi.fn();

beforeEach(() => {
  steps.length = 0;
  localStorage.setItem('espalier-data:ines:draft', 'text');
  sessionStorage.setItem('espalier-data:ines:draft', 'text');
  // What jsdom has not got: storage of three more kinds, and a browser that can be woken.
  const subscription = { unsubscribe: async () => steps.push('push') };
  const registration = {
    pushManager: { getSubscription: async () => subscription },
    unregister: async () => steps.push('service worker'),
  };
  Object.assign(navigator, {
    serviceWorker: {
      getRegistration: async () => registration,
      getRegistrations: async () => [registration],
    },
  });
  vi.stubGlobal('caches', {
    keys: async () => ['one'],
    delete: async (name: string) => steps.push(`cache ${name}`),
  });
  vi.stubGlobal('indexedDB', {
    databases: async () => [{ name: 'kept' }],
    deleteDatabase: (name: string) => steps.push(`database ${name}`),
  });
  vi.stubGlobal('location', { ...window.location, replace, reload });
});
afterEach(() => {
  Reflect.deleteProperty(navigator, 'serviceWorker');
  vi.unstubAllGlobals();
});

it('leaves nothing behind: push, session, storage, databases, caches, service worker, and then the page', async () => {
  serve({ 'DELETE /api/session': () => void steps.push('session') });
  const heard = new Promise((resolve) => {
    const stop = listenToOtherTabs((news) => {
      stop();
      resolve(news);
    });
  });
  await startI18n();
  await loadWords(['leaving']);
  const { queryClient } = await showTo(inesHerself(), <SignOutButton />);
  queryClient.setQueryData(['today'], { firstName: 'Ines' });
  await user.click(screen.getByRole('button', { name: 'Sign out' }));
  await waitFor(() => expect(replace).toHaveBeenCalledExactlyOnceWith('/sign-in'));
  expect(steps.slice(0, 2)).toEqual(['push', 'session']);
  expect(steps.slice(2, -1).sort()).toEqual(['cache one', 'database kept', 'service worker']);
  expect(steps.at(-1)).toBe('page: /sign-in');
  expect([localStorage.length, sessionStorage.length]).toEqual([0, 0]);
  expect(queryClient.getQueryData(['today'])).toBeUndefined();
  expect(await heard).toEqual({ kind: 'signed-out' });
});

it('keeps the person signed in, and what is theirs, where the server cannot be reached', async () => {
  replace.mockClear();
  serve({ 'DELETE /api/session': () => lost });
  await startI18n();
  await loadWords(['leaving']);
  await showTo(inesHerself(), <SignOutButton />);
  await user.click(screen.getByRole('button', { name: 'Sign out' }));
  expect(await screen.findByText(/You are not signed out yet/)).toBeDefined();
  expect(localStorage.length).toBe(1);
  expect(replace).not.toHaveBeenCalled();
});

it('a page that the browser kept whole is hidden and loaded anew when somebody goes back to it', () => {
  reloadRestoredPages();
  window.dispatchEvent(new PageTransitionEvent('pageshow', { persisted: false }));
  expect(reload).not.toHaveBeenCalled();
  window.dispatchEvent(new PageTransitionEvent('pageshow', { persisted: true }));
  expect(reload).toHaveBeenCalledOnce();
  expect(document.body.hidden).toBe(true);
  document.body.hidden = false;
});
