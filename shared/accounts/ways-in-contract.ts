import { z } from 'zod';
import { contract } from '../http/contract.ts';
import { invitationKinds } from '../people/invitations.ts';
import { me } from './contract.ts';
import { emailField, newPasswordField, passkeyAnswer, passkeyQuestion } from './fields.ts';

const passkeyName = z.string().trim().min(1, 'Give it a name.').max(60, 'That name is too long.');

const waysIn = z.object({
  email: z.string(),
  hasPassword: z.boolean(),
  passkeys: z.array(
    z.object({
      id: z.uuid(),
      name: z.string(),
      createdAt: z.iso.datetime(),
      lastUsedAt: z.iso.datetime().nullable(),
    }),
  ),
  authenticator: z.boolean(),
  /** Recovery codes that are still good. */
  recoveryCodesLeft: z.number().int(),
  /** A new address that waits to be confirmed. */
  pendingEmail: z.string().nullable(),
});
export type WaysIn = z.output<typeof waysIn>;

export const getWaysIn = contract({
  method: 'get',
  path: '/api/ways-in',
  summary: 'One’s own password, passkeys, authenticator and recovery codes, as far as they are there.',
  status: 200,
  output: waysIn,
});

export const askNewPasskey = contract({
  method: 'post',
  path: '/api/passkeys/question',
  summary: 'The question with which the browser makes a passkey. Needs a fresh proof.',
  status: 200,
  output: passkeyQuestion,
});

export const addPasskey = contract({
  method: 'post',
  path: '/api/passkeys',
  summary: 'Keep a passkey that the browser made. Needs a fresh proof.',
  status: 201,
  body: z.strictObject({ passkey: passkeyAnswer, name: passkeyName.optional() }),
  output: waysIn,
});

export const removePasskey = contract({
  method: 'delete',
  path: '/api/passkeys/:passkeyId',
  summary: 'Remove one of one’s own passkeys. The last way in stays. Needs a fresh proof.',
  status: 200,
  params: z.object({ passkeyId: z.uuid() }),
  output: waysIn,
});

export const startAuthenticator = contract({
  method: 'post',
  path: '/api/authenticator',
  summary: 'Begin to set up an authenticator app (RFC 6238). Needs a fresh proof.',
  status: 201,
  output: z.object({
    /** Base 32, for typing. */
    secret: z.string(),
    uri: z.string(),
    /** The same as a picture, an SVG as a data address. */
    picture: z.string(),
  }),
});

export const confirmAuthenticator = contract({
  method: 'post',
  path: '/api/authenticator/confirmation',
  summary: 'A first code shows that the app holds the secret; the answer holds the recovery codes, once.',
  status: 200,
  body: z.strictObject({ code: z.string().trim().min(6, 'Enter the code of six digits.').max(12) }),
  output: z.object({ recoveryCodes: z.array(z.string()) }),
});

export const removeAuthenticator = contract({
  method: 'delete',
  path: '/api/authenticator',
  summary: 'Remove the authenticator app. Staff keep a second factor. Needs a fresh proof.',
  status: 200,
  output: waysIn,
});

export const newRecoveryCodes = contract({
  method: 'post',
  path: '/api/recovery-codes',
  summary: 'Ten new recovery codes; the old ones open nothing any more. Needs a fresh proof.',
  status: 201,
  output: z.object({ recoveryCodes: z.array(z.string()) }),
});

export const changePassword = contract({
  method: 'put',
  path: '/api/password',
  summary: 'Choose a new password; every other session ends. Needs a fresh proof.',
  status: 200,
  body: z.strictObject({ password: newPasswordField }),
  output: waysIn,
});

export const askPasswordReset = contract({
  method: 'post',
  path: '/api/password-resets',
  summary: 'Mail a link to choose a new password. The answer is the same for known and unknown addresses.',
  status: 204,
  body: z.strictObject({ email: emailField }),
});

export const usePasswordReset = contract({
  method: 'post',
  path: '/api/password-resets/use',
  summary: 'Choose a new password with the link of the mail; every session ends. Sign in follows.',
  status: 204,
  body: z.strictObject({ token: z.string().max(200), password: newPasswordField }),
});

export const askEmailChange = contract({
  method: 'post',
  path: '/api/email-changes',
  summary: 'Mail a link to a new address; it holds once it is opened there. Needs a fresh proof.',
  status: 200,
  body: z.strictObject({ email: emailField }),
  output: waysIn,
});

export const useEmailChange = contract({
  method: 'post',
  path: '/api/email-changes/use',
  summary: 'Confirm a new address with the link that was mailed to it.',
  status: 204,
  body: z.strictObject({ token: z.string().max(200) }),
});

/** By the link of a mail or QR code, or by the letter's short code. */
const invitationKey = z.union([
  z.strictObject({ token: z.string().min(1).max(200) }),
  z.strictObject({ code: z.string().trim().min(1, 'Enter the code of the letter.').max(40) }),
]);

export const lookAtInvitationBody = z.strictObject({ invitation: invitationKey });

export const lookAtInvitation = contract({
  method: 'post',
  path: '/api/invitations/look',
  summary: 'What an invitation opens. Looking uses nothing up.',
  status: 200,
  body: lookAtInvitationBody,
  output: z.object({
    state: z.enum(['open', 'used', 'expired', 'revoked']),
    kind: z.enum(invitationKinds),
    clinic: z.object({ name: z.string(), phone: z.string(), emergencyNumber: z.string() }),
    /** Only while it is open. */
    firstName: z.string().nullable(),
    email: z.string().nullable(),
    expiresAt: z.iso.datetime(),
  }),
});

export const askInvitationPasskey = contract({
  method: 'post',
  path: '/api/invitations/passkey-question',
  summary: 'The question with which the browser makes the first passkey.',
  status: 200,
  body: lookAtInvitationBody,
  output: passkeyQuestion,
});

export const acceptInvitationBody = z.strictObject({
  invitation: invitationKey,
  way: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('password'), password: newPasswordField }),
    z.strictObject({ kind: z.literal('passkey'), passkey: passkeyAnswer }),
  ]),
  staySignedIn: z.boolean().default(false),
});

export const acceptInvitation = contract({
  method: 'post',
  path: '/api/invitations/accept',
  summary: 'Make the first way in and sign in. An invitation is accepted once.',
  status: 201,
  body: acceptInvitationBody,
  output: z.object({ me }),
});

export const askInvitationAgain = contract({
  method: 'post',
  path: '/api/invitations/ask-again',
  summary: 'The invitation was used up or came too late: ask the clinic for a new one.',
  status: 204,
  body: lookAtInvitationBody,
});
