import type { Message } from '#shared/threads/contract.ts';
import { localDateOf } from '#src/lib/format.ts';

export type ThreadEntry =
  { kind: 'day'; key: string; localDate: string } | { kind: 'message'; key: string; message: Message };

/** The messages with a line before the first one of each day, by the calendar of the given zone. */
export function entriesOf(messages: readonly Message[], timeZone: string): ThreadEntry[] {
  let shownDate: string | null = null;
  return messages.flatMap((message) => {
    const localDate = localDateOf(message.sentAt, timeZone);
    const entry: ThreadEntry = { kind: 'message', key: message.id, message };
    if (localDate === shownDate) return [entry];
    shownDate = localDate;
    return [{ kind: 'day' as const, key: `${localDate}/${message.sequence}`, localDate }, entry];
  });
}
