import type { Message, ThreadDetail } from '#shared/threads/contract.ts';

export type Side = 'patient' | 'clinic';

export type SeenMark = { sequence: number; by: string; at: string };

/**
 * The newest message of one side that somebody of the other side has had on the screen, with who was first to
 * get that far. Only this one message carries the line: an earlier one was seen no later.
 */
export function seenMarkOf(
  messages: readonly Message[],
  participants: ThreadDetail['participants'],
  side: Side,
): SeenMark | null {
  const readers = participants.filter((participant) => participant.side !== side);
  const furthest = Math.max(0, ...readers.map((reader) => reader.seenSequence));
  const message = messages.findLast(({ author, sequence }) => author?.side === side && sequence <= furthest);
  if (!message) return null;
  const first = readers
    .flatMap(({ name, seenAt, seenSequence }) =>
      seenAt !== null && seenSequence >= message.sequence ? [{ by: name, at: seenAt }] : [],
    )
    .sort((a, b) => a.at.localeCompare(b.at))[0];
  return first ? { sequence: message.sequence, ...first } : null;
}
