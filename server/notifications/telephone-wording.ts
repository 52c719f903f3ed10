import type { NotificationKind } from '#shared/notifications/kinds.ts';

/** One neutral sentence for whoever picks up or reads it: no name, no health fact. */
const sentences: Partial<Record<NotificationKind, string>> = {
  'new-emergency': 'An emergency page is waiting for you in Espalier. Please open it now.',
  'new-urgent': 'An urgent page is waiting for you in Espalier. Please open it soon.',
  test: 'This is a test from Espalier. Nothing is waiting for you.',
};

export const telephoneSentence = (kind: NotificationKind): string =>
  sentences[kind] ?? 'Something is waiting for you in Espalier. Please open it.';

export const keyPressSentence = 'Press 1 to say that you have heard this.';
export const thankYouSentence = 'Thank you. Open Espalier now.';
