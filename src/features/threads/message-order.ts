import type { Message } from '#shared/threads/contract.ts';

/** Both lists as one, in the thread's order; a message that is in both stands once, as it came last. */
export function mergeBySequence(known: readonly Message[], incoming: readonly Message[]): Message[] {
  const bySequence = new Map(known.map((message) => [message.sequence, message]));
  incoming.forEach((message) => bySequence.set(message.sequence, message));
  return [...bySequence.values()].sort((a, b) => a.sequence - b.sequence);
}

/**
 * The messages from the first up to the first gap. What stands behind a gap waits until the gap is filled,
 * since a message that is on the screen must never move.
 */
export function withoutGap(messages: readonly Message[]): Message[] {
  const gapAt = messages.findIndex((message, index) => message.sequence !== index + 1);
  return gapAt === -1 ? [...messages] : messages.slice(0, gapAt);
}

export type MessagePage = { messages: Message[]; lastSequence: number };

/** Asks for pages, one after the other, until nothing is missing up to the thread's last message. */
export async function catchUpMessages(
  known: readonly Message[],
  fetchPage: (after: number) => Promise<MessagePage>,
): Promise<Message[]> {
  let messages = [...known];
  for (;;) {
    const after = withoutGap(messages).length;
    const page = await fetchPage(after);
    messages = mergeBySequence(messages, page.messages);
    const reached = withoutGap(messages).length;
    // A page that brings nothing on ends the loop as well, or a faulty answer would be asked for for ever.
    if (reached >= page.lastSequence || reached === after) return messages;
  }
}
