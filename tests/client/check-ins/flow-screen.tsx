import { screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { CheckInFlow } from '#src/features/check-ins/CheckInFlow.tsx';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';
import { checkInWords } from '#src/features/check-ins/word-files.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { noorSignedIn, showTo } from '../clinic/screen.tsx';

const user = userEvent.setup({ delay: null });

/** Clears the device and gives a person of her own to each test, since the outbox of alerts lives as long as the tab. */
export async function arriveAsInes(): Promise<Me> {
  sessionStorage.clear();
  localStorage.clear();
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  await startI18n();
  await loadWords(checkInWords);
  return {
    ...noorSignedIn,
    personId: crypto.randomUUID(),
    name: 'Ines Valcourt',
    roles: ['patient'],
    // She did not choose to stay signed in, so nothing may outlive the tab.
    session: { idleEndsAt: '2026-12-01T09:10:00.000Z', endsAt: '2026-12-02T07:00:00.000Z' },
    secondFactor: 'not-needed',
    patient: {
      id: '0f3a7c1e-6a52-4f0b-8a44-3b6f6b0f2a11',
      arm: 'left',
      controlsTowards: 'right',
      state: 'active',
      stateSince: null,
    },
  };
}

export async function showFlow(me: Me, start: CheckInDraft) {
  const shown = await showTo(me, <CheckInFlow start={start} firstName="Ines" />);
  shown.queryClient.setQueryData(sessionQuery.queryKey, { me });
  return shown;
}

export const heading = () => screen.getByRole('heading', { level: 1 });
export const press = (name: string | RegExp) => user.click(screen.getByRole('button', { name }));
export const tick = (name: string | RegExp) => user.click(screen.getByRole('checkbox', { name }));
