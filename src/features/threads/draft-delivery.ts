import type { Message } from '#shared/threads/contract.ts';
import type { Draft } from '#src/lib/drafts.ts';

/**
 * What a thread tells of a draft whose sending seemed to fail: nothing of it has come, the whole of it has, or
 * an earlier wording has and the text was changed since.
 */
export function deliveryOf(draft: Draft, messages: readonly Message[]): 'not-there' | 'there' | 'changed' {
  const sent = messages.find((message) => message.clientId === draft.id);
  if (!sent) return 'not-there';
  return sent.text === draft.text.trim() ? 'there' : 'changed';
}
