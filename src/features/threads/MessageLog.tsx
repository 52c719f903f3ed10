import { ArrowDown } from 'lucide-react';
import { useEffect, useLayoutEffect, useRef, useState } from 'react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import { useMe } from '#src/app/session.tsx';
import { Button } from '#src/components/Button.tsx';
import { formatDayAndDate, localDateOf } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';
import { useIsAttended, useIsInView } from './attention.ts';
import { MessageItem } from './MessageItem.tsx';
import { useMarkSeen } from './queries.ts';
import { holdPlace, scrollToEnd } from './scroll-place.ts';
import { seenMarkOf } from './seen-mark.ts';
import type { Side } from './seen-mark.ts';
import { entriesOf } from './thread-entries.ts';

/** How many messages are drawn at first, and with each look further back. */
const shownAtOnce = 40;

type Props = {
  thread: ThreadDetail;
  messages: readonly Message[];
  side: Side;
  /** What grows with the messages, with a text being written, and when the fonts arrive. */
  frame: RefObject<HTMLElement | null>;
  /** How many messages have been sent from here since the thread was opened: the view follows each. */
  followOwn: number;
};

/**
 * The messages, opened at their end. What arrives moves the view only for whoever is at the end; others keep
 * their place and get a button. It is there only once all messages are known.
 */
export function MessageLog({ thread, messages, side, frame, followOwn }: Props) {
  const { t } = useTranslation('threads');
  const { personId, clinic } = useMe();
  const nowMs = useNowMs();
  const count = messages.length;
  const [from, setFrom] = useState(Math.max(0, count - shownAtOnce));
  const [openedWith] = useState(count);
  const list = useRef<HTMLOListElement>(null);
  const end = useRef<HTMLDivElement>(null);
  const restorePlace = useRef<(() => void) | null>(null);
  const endInView = useIsInView(end);
  const attended = useIsAttended();

  // How many there were when the end was last in view: what came after them has not been looked at.
  const [lookedAt, setLookedAt] = useState(count);
  if (endInView && lookedAt !== count) setLookedAt(count);
  const below = count - lookedAt;

  const staysAtEnd = useRef(true);
  useEffect(() => {
    staysAtEnd.current = true;
    if (end.current) scrollToEnd(end.current);
  }, [followOwn]);
  useEffect(() => {
    if (!endInView) return undefined;
    staysAtEnd.current = true;
    return () => {
      staysAtEnd.current = false;
    };
  }, [endInView]);
  useEffect(() => {
    if (!frame.current) return undefined;
    const observer = new ResizeObserver(() => {
      if (staysAtEnd.current && end.current) scrollToEnd(end.current);
    });
    observer.observe(frame.current);
    return () => observer.disconnect();
  }, [frame]);

  useLayoutEffect(() => {
    restorePlace.current?.();
    restorePlace.current = null;
  }, [from]);
  function showEarlier() {
    const first = list.current?.querySelector('li');
    if (first) restorePlace.current = holdPlace(first);
    staysAtEnd.current = false;
    setFrom(Math.max(0, from - shownAtOnce));
  }

  const { mutate: markSeen } = useMarkSeen(thread.id);
  const marked = useRef(0);
  const seenByMe = thread.participants.find((person) => person.personId === personId)?.seenSequence ?? 0;
  useEffect(() => {
    const isNews = count > Math.max(seenByMe, marked.current);
    if (!isNews || !endInView || !attended) return;
    marked.current = count;
    markSeen(count);
  }, [count, seenByMe, endInView, attended, markSeen]);

  const seen = seenMarkOf(messages, thread.participants, side);
  const today = localDateOf(nowMs, clinic.timeZone);
  const newest = messages.at(-1);
  const arrived = count > openedWith && newest?.author?.side !== side ? newest : undefined;
  return (
    <div className="grow [overflow-anchor:none]">
      {from > 0 ? (
        <div className="grid justify-items-center py-2">
          <Button variant="outline" onClick={showEarlier}>
            {t('thread.earlier', { count: Math.min(from, shownAtOnce) })}
          </Button>
        </div>
      ) : null}
      <ol ref={list} aria-label={t('thread.log')}>
        {entriesOf(messages.slice(from), clinic.timeZone).map((entry) =>
          entry.kind === 'day' ? (
            <li key={entry.key} className="pt-4 pb-1 text-center text-sm font-bold text-ink-soft">
              {entry.localDate === today ? t('thread.today') : formatDayAndDate(entry.localDate)}
            </li>
          ) : (
            <MessageItem
              key={entry.key}
              message={entry.message}
              patientName={thread.patient.name}
              side={side}
              seen={seen}
            />
          ),
        )}
      </ol>
      <div ref={end} className="h-px" />
      {/* The live region stands empty until then, or what arrives in it is not announced. */}
      <p role="status" className="sr-only">
        {arrived ? t('thread.arrived', { name: arrived.author?.name ?? '', text: arrived.text }) : null}
      </p>
      {below > 0 ? (
        <div className="sticky bottom-4 z-10 grid justify-items-center">
          <Button icon={ArrowDown} onClick={() => end.current && scrollToEnd(end.current)}>
            {t('thread.toEnd', { count: below })}
          </Button>
        </div>
      ) : null}
    </div>
  );
}
