import type { NotificationKind } from '#shared/notifications/kinds.ts';

/**
 * One wording per kind: no name, no health fact, nothing of what was asked or answered. Whoever reads it over
 * a shoulder learns that Espalier has something for its reader, and how soon.
 */
type Wording = { subject: string; line: string; button: string };

const wordings: Record<NotificationKind, Wording> = {
  'new-emergency': {
    subject: 'an emergency flag is waiting',
    line: 'An emergency flag is waiting in the morning round. Please open it now.',
    button: 'Open the flag',
  },
  'new-urgent': {
    subject: 'an urgent flag is waiting',
    line: 'An urgent flag is waiting in the morning round. Please open it soon.',
    button: 'Open the flag',
  },
  'new-flag': {
    subject: 'a flag is waiting',
    line: 'A new flag is waiting in the morning round.',
    button: 'Open the flag',
  },
  'new-message': {
    subject: 'a message is waiting',
    line: 'A new message is waiting for you.',
    button: 'Open the message',
  },
  'check-in-reminder': {
    subject: 'today’s check-in is waiting',
    line: 'Your check-in for today is waiting for you. It takes about a minute.',
    button: 'Open the check-in',
  },
  invitation: {
    subject: 'you are invited',
    line: 'You are invited to Espalier. This link is for you alone, and works once.',
    button: 'Accept the invitation',
  },
  'password-reset': {
    subject: 'choose a new password',
    line: 'Somebody asked for a new password for this address. If it was not you, do nothing.',
    button: 'Choose a new password',
  },
  'email-change': {
    subject: 'confirm this address',
    line: 'Somebody wants to use this address for Espalier. If it was not you, do nothing.',
    button: 'Confirm this address',
  },
  'sign-in-changed': {
    subject: 'your ways to sign in have changed',
    line: 'Your ways to sign in have changed. If it was not you, call your clinic.',
    button: 'See your ways to sign in',
  },
  'two-person-act': {
    subject: 'a decision is waiting',
    line: 'A colleague asks for something that takes two people, and you may decide it.',
    button: 'Open the request',
  },
  'invitation-asked': {
    subject: 'somebody asks for a new invitation',
    line: 'Somebody came too late for an invitation and asks for a new one.',
    button: 'Open the request',
  },
  'watching-ended': {
    subject: 'your clinic has closed your record',
    line: 'Your clinic no longer watches what comes in here. Please read what that means.',
    button: 'Read what that means',
  },
  'caring-began': {
    subject: 'somebody asks for your help',
    line: 'Somebody asks you to help them with Espalier. If you did not expect this, call your clinic.',
    button: 'See whom you help',
  },
  test: {
    subject: 'this is a test',
    line: 'This is a test. If you can read or hear it, it works.',
    button: 'Open Espalier',
  },
};

const closing = [
  'This mail says no more on purpose.',
  'Do not answer this mail: nobody reads the answers. In an emergency call the emergency number.',
];

/** What a mail of a kind says, before it is set as text or as HTML. */
export const mailWords = (kind: NotificationKind) => {
  const { subject, line, button } = wordings[kind];
  return { subject: `Espalier: ${subject}`, line, button, closing };
};

/** What a push of a kind shows, also on a locked screen. */
export const pushWords = (kind: NotificationKind): { title: string; body: string } => ({
  title: 'Espalier',
  body: wordings[kind].line,
});
