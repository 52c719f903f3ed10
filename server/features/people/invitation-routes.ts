import {
  acceptInvitation,
  askInvitationAgain,
  askInvitationPasskey,
  lookAtInvitation,
} from '#shared/accounts/ways-in-contract.ts';
import { route } from '../../http/route.ts';
import { accept } from './accepting.ts';
import { askAgain, askFirstPasskey, look } from './looking.ts';

/** Whoever holds an invitation has no account yet: the secret of its link or letter is what lets them act. */
export const invitationRoutes = [
  route(lookAtInvitation, {
    access: { public: 'Whoever was invited has no account yet. The link or the letter’s code is the key.' },
    audit: { none: 'Looking changes nothing, and scanners of mail do it too.' },
    handler: ({ body, ...context }) => look(context, body.invitation),
  }),
  route(askInvitationPasskey, {
    access: { public: 'The first passkey is made before there is an account.' },
    audit: { none: 'A question changes nothing.' },
    handler: ({ body, ...context }) => askFirstPasskey(context, body.invitation),
  }),
  route(acceptInvitation, {
    access: { public: 'This is the first way in.' },
    audit: { none: 'The handler writes invitation.accepted and session.started for whom it is.' },
    handler: async ({ body, ...context }) => ({ me: await accept(context, body) }),
  }),
  route(askInvitationAgain, {
    access: { public: 'Somebody who came too late has no other way to ask.' },
    audit: { none: 'The handler writes invitation.asked-again where there is something to ask for.' },
    handler: ({ body, ...context }) => askAgain(context, body.invitation),
  }),
];
