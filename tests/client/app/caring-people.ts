import type { Me } from '#shared/accounts/contract.ts';
import { noorSignedIn } from '../clinic/screen.tsx';

type Cared = Me['caresFor'][number];

const card = { arm: 'left', controlsTowards: 'right', state: 'active', stateSince: null } as const;

export const ines: Cared = {
  ...card,
  id: '0f3a7c1e-6a52-4f0b-8a44-3b6f6b0f2a11',
  name: 'Ines Valcourt',
  mayCheckIn: true,
  mayMessage: true,
  until: null,
};

export const wendell: Cared = { ...ines, id: '5b1f0a52-1d0e-4c53-9c3a-0d7c6a1f2b22', name: 'Wendell Osei' };

/** Marta looks after people and is no patient herself. Each test gets a person of its own. */
export const marta = (caresFor: Cared[]): Me => ({
  ...noorSignedIn,
  personId: crypto.randomUUID(),
  name: 'Marta Valcourt',
  email: 'marta.valcourt@mail.example',
  roles: ['caregiver'],
  caresFor,
  secondFactor: 'not-needed',
  // Not staying signed in, and not idle for as long as any test runs.
  session: {
    idleEndsAt: new Date(Date.now() + 20 * 60_000).toISOString(),
    endsAt: '2099-01-02T00:00:00.000Z',
  },
});

/** A patient who looks after nobody. */
export const inesHerself = (part: Partial<NonNullable<Me['patient']>> = {}): Me => ({
  ...marta([]),
  name: 'Ines Valcourt',
  email: 'ines.valcourt@mail.example',
  roles: ['patient'],
  patient: { ...card, id: ines.id, ...part },
});
