import { useMutation, useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type {
  acceptInvitation,
  askInvitationAgain,
  askInvitationPasskey,
  lookAtInvitation,
} from '#shared/accounts/ways-in-contract.ts';
import type { OutputOf, RequestOf } from '#shared/http/contract.ts';
import { call } from '#src/lib/api.ts';
import { makePasskey } from '#src/lib/passkeys.ts';
import { firstPlaceOf, useBegin } from './begin.ts';
import { remember } from './device-memory.ts';

/** The secret of a link, or the code of a letter. */
export type InvitationKey = RequestOf<typeof lookAtInvitation>['body']['invitation'];
/** Whose device it is: one of the person's own keeps them signed in. */
export type DeviceChoice = 'own' | 'shared';
export type SeenInvitation = OutputOf<typeof lookAtInvitation>;

const look = (invitation: InvitationKey, signal?: AbortSignal) =>
  call<typeof lookAtInvitation>('post', '/api/invitations/look', { body: { invitation } }, { signal });

export const useInvitation = (invitation: InvitationKey, enabled: boolean) =>
  useQuery({
    queryKey: ['invitation', invitation],
    queryFn: ({ signal }) => look(invitation, signal),
    enabled,
    // It changes under nobody's hands; whether it is still good is decided when it is accepted.
    staleTime: Infinity,
    refetchOnWindowFocus: false,
  });

export const useLook = () => useMutation({ mutationFn: (invitation: InvitationKey) => look(invitation) });

type Accepted = RequestOf<typeof acceptInvitation>['body'];

/** Goes on to the first screen of whoever is signed in now; the press that led there stays busy until then. */
function useAccepted() {
  const begin = useBegin();
  const navigate = useNavigate();
  return async (
    { me }: OutputOf<typeof acceptInvitation>,
    { way, staySignedIn }: Omit<Accepted, 'invitation'>,
  ) => {
    remember('own-phone', staySignedIn === true);
    if (way.kind === 'passkey') remember('passkey-used', true);
    begin(me);
    await navigate(firstPlaceOf(me), { replace: true });
  };
}

const accept = (body: Accepted) => call<typeof acceptInvitation>('post', '/api/invitations/accept', { body });

/** Makes the first passkey and signs in with it: what one press on a choice begins. */
export function useAcceptByPasskey(invitation: InvitationKey) {
  const accepted = useAccepted();
  return useMutation({
    mutationFn: async (staySignedIn: boolean) => {
      const question = await call<typeof askInvitationPasskey>('post', '/api/invitations/passkey-question', {
        body: { invitation },
      });
      const way = { kind: 'passkey' as const, passkey: await makePasskey(question) };
      await accepted(await accept({ invitation, way, staySignedIn }), { way, staySignedIn });
    },
  });
}

export function useAcceptByPassword(invitation: InvitationKey) {
  const accepted = useAccepted();
  return useMutation({
    mutationFn: async ({ password, staySignedIn }: { password: string; staySignedIn: boolean }) => {
      const way = { kind: 'password' as const, password };
      await accepted(await accept({ invitation, way, staySignedIn }), { way, staySignedIn });
    },
  });
}

export const useAskAgain = (invitation: InvitationKey) =>
  useMutation({
    mutationFn: () =>
      call<typeof askInvitationAgain>('post', '/api/invitations/ask-again', { body: { invitation } }),
  });
