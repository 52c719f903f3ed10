import type { Delivery } from '#shared/notifications/contract.ts';

export const channelWords: Record<Delivery['channel'], string> = {
  push: 'Push',
  email: 'E-mail',
  sms: 'SMS',
  phone: 'Telephone call',
};

export const kindWords: Record<Delivery['kind'], string> = {
  'new-emergency': 'Page: emergency',
  'new-urgent': 'Page: urgent',
  'new-flag': 'New flag',
  'new-message': 'New message',
  'check-in-reminder': 'Check-in reminder',
  invitation: 'Invitation',
  'password-reset': 'Password reset',
  'email-change': 'Change of e-mail address',
  'sign-in-changed': 'Change of the ways in',
  'two-person-act': 'Something to confirm',
  'invitation-asked': 'Request for a new invitation',
  'watching-ended': 'The clinic no longer watches',
  'caring-began': 'Asked to help a patient',
  test: 'Test',
};

const stateWords: Record<Delivery['state'], string> = {
  pending: 'Waiting',
  sent: 'Sent',
  failed: 'Failed',
  bounced: 'Came back',
  dropped: 'No longer needed',
};

/** What a gateway said at the end of a call or an SMS. */
const outcomeWords: Record<string, string> = {
  answered: 'Answered',
  acknowledged: 'Acknowledged by a key press',
  delivered: 'Delivered',
};

/** Why something did not arrive, and what it takes; keyed by the codes that the server keeps. */
const failureWords: Record<string, string> = {
  bounced: 'The address refuses mail. Check it with the person.',
  'came-back': 'The mail came back. Check the address with the person.',
  gone: 'That browser takes no more push messages.',
  refused: 'The gateway does not take it. Check the number or the address.',
  'not-configured': 'This installation has no gateway for it.',
  'link-spent': 'The link in it could no longer be used.',
  'no-answer': 'Nobody answered the call.',
  busy: 'The line was busy.',
  failed: 'The call or SMS could not be put through. Check the number.',
  undelivered: 'The SMS was not delivered. Check the number.',
  timeout: 'The gateway did not answer in time.',
};

/** Codes of the network are many; all of them mean that nothing was reached. */
const networkCode = /^(E[A-Z]+|UND_ERR_\w+)$/;

export function failureOf({ lastError }: Pick<Delivery, 'lastError'>): string | null {
  if (lastError === null) return null;
  const known = failureWords[lastError];
  if (known !== undefined) return known;
  if (networkCode.test(lastError)) return `The gateway could not be reached (${lastError}).`;
  return `It could not be sent (${lastError}).`;
}

/** Sent, and what became of it; or that it waits, failed or came back. */
export function stateOf({ state, outcome }: Pick<Delivery, 'state' | 'outcome'>): string {
  const said = outcome === null ? undefined : outcomeWords[outcome];
  return state === 'sent' && said !== undefined ? said : stateWords[state];
}

export const triesWords = (attempts: number): string => (attempts === 1 ? '1 try' : `${attempts} tries`);
