import {
  addPasskey,
  askEmailChange,
  askNewPasskey,
  askPasswordReset,
  changePassword,
  confirmAuthenticator,
  getWaysIn,
  newRecoveryCodes,
  removeAuthenticator,
  removePasskey,
  startAuthenticator,
  useEmailChange,
  usePasswordReset,
} from '#shared/accounts/ways-in-contract.ts';
import { route } from '../../http/route.ts';
import { askForEmailChange, confirmEmailChange } from './email-change.ts';
import {
  confirmOwnAuthenticator,
  removeOwnAuthenticator,
  renewRecoveryCodes,
  startOwnAuthenticator,
} from './own-authenticator.ts';
import { addOwnPasskey, askForNewPasskey, removeOwnPasskey } from './own-passkeys.ts';
import { changeOwnPassword } from './own-password.ts';
import { askForReset, resetPassword } from './password-reset.ts';
import { waysInOf } from './ways-in.ts';

const sensitive = { permission: 'account:own', proof: true } as const;

/** What staff need in order to set up their first second factor. */
const setUp = { permission: 'account:own', beforeSecondFactor: true } as const;

export const wayInRoutes = [
  route(getWaysIn, {
    access: setUp,
    audit: { none: 'Reads only one’s own ways in.' },
    handler: ({ actor, site, now }) => waysInOf(site.gate, actor.personId, now),
  }),
  route(askNewPasskey, {
    access: { ...setUp, proof: true },
    audit: { none: 'A question changes nothing.' },
    handler: askForNewPasskey,
  }),
  route(addPasskey, {
    access: { ...setUp, proof: true },
    audit: 'passkey.added',
    handler: (context) => addOwnPasskey(context, context.body),
  }),
  route(removePasskey, {
    access: sensitive,
    audit: 'passkey.removed',
    handler: (context) => removeOwnPasskey(context, context.params.passkeyId),
  }),
  route(startAuthenticator, {
    access: { ...setUp, proof: true },
    audit: 'authenticator.started',
    handler: startOwnAuthenticator,
  }),
  route(confirmAuthenticator, {
    access: setUp,
    audit: 'authenticator.confirmed',
    handler: async (context) => ({
      recoveryCodes: await confirmOwnAuthenticator(context, context.body.code),
    }),
  }),
  route(removeAuthenticator, {
    access: sensitive,
    audit: 'authenticator.removed',
    handler: removeOwnAuthenticator,
  }),
  route(newRecoveryCodes, {
    access: sensitive,
    audit: 'recovery-codes.renewed',
    handler: async (context) => ({ recoveryCodes: await renewRecoveryCodes(context) }),
  }),
  route(changePassword, {
    access: sensitive,
    audit: 'password.changed',
    handler: (context) => changeOwnPassword(context, context.body.password),
  }),
  route(askPasswordReset, {
    access: { public: 'Whoever forgot their password cannot sign in.' },
    audit: { none: 'It changes nothing: the mail has a row of its own.' },
    handler: (context) => askForReset(context, context.body.email),
  }),
  route(usePasswordReset, {
    access: { public: 'The link of the mail is the way in, once.' },
    audit: { none: 'The entry password.reset is written once it is known whose link it is.' },
    handler: (context) => resetPassword(context, context.body),
  }),
  route(askEmailChange, {
    access: sensitive,
    audit: 'email-change.asked',
    handler: (context) => askForEmailChange(context, context.body.email),
  }),
  route(useEmailChange, {
    access: { public: 'The link of the mail is opened where the mail is read, signed in there or not.' },
    audit: { none: 'The entry email.changed is written once it is known whose link it is.' },
    handler: (context) => confirmEmailChange(context, context.body.token),
  }),
];
