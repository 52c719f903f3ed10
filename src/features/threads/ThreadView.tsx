import { useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import { useMe } from '#src/app/session.tsx';
import { classNames } from '#src/components/class-names.ts';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { ApiProblem } from '#src/lib/problem.ts';
import { Composer } from './Composer.tsx';
import { MessageLog } from './MessageLog.tsx';
import { OutOfHours } from './OutOfHours.tsx';
import { threadListPlace } from './places.ts';
import { useMessages, useThread } from './queries.ts';
import { useRefusal } from './refusal.ts';
import type { Side } from './seen-mark.ts';
import { ThreadHead } from './ThreadHead.tsx';

type Props = {
  threadId: string;
  side: Side;
  /** Why nothing can be written here, where that is so; it stands in the place of the composer. */
  readOnly?: string | undefined;
};

/** One thread, live: its messages and where one writes. On a patient's page it brings the first heading. */
export function ThreadView({ threadId, side, readOnly }: Props) {
  const { t } = useTranslation(['threads', 'app']);
  const thread = useThread(threadId);
  const messages = useMessages(threadId);
  const error = thread.error ?? messages.error;
  const refusal = useRefusal(error);
  if (thread.data && messages.data) {
    const open = { thread: thread.data, messages: messages.data, side, readOnly };
    return <OpenThread key={threadId} {...open} />;
  }
  if (!error) return <LoadingState label={t('thread.loading')} lines={8} />;
  if (error instanceof ApiProblem && error.code === 'not-found') {
    return (
      <ErrorState title={t('thread.gone')}>
        <LinkButton to={threadListPlace(side)} variant="outline">
          {t('thread.toList')}
        </LinkButton>
      </ErrorState>
    );
  }
  const retry = () => Promise.all([thread.refetch(), messages.refetch()]);
  return (
    <ErrorState
      title={t('thread.failed')}
      retry={{
        label: t('app:tryAgain'),
        onRetry: () => void retry(),
        busy: thread.isFetching || messages.isFetching,
      }}
    >
      {refusal}
    </ErrorState>
  );
}

type OpenThreadProps = Omit<Props, 'threadId'> & { thread: ThreadDetail; messages: readonly Message[] };

function OpenThread({ thread, messages, side, readOnly }: OpenThreadProps) {
  const { t } = useTranslation('threads');
  const { clinic } = useMe();
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus({ preventScroll: true }), []);
  const frame = useRef<HTMLElement>(null);
  const [sentHere, setSentHere] = useState(0);
  const isClinic = side === 'clinic';
  return (
    <article ref={frame} className={classNames('flex flex-col', isClinic && 'min-h-full')}>
      <ThreadHead thread={thread} side={side} headingRef={heading} />
      <MessageLog thread={thread} messages={messages} side={side} frame={frame} followOwn={sentHere} />
      <div
        className={classNames(
          'grid gap-3 pt-3',
          // A patient's page keeps its own bar at the foot, and two of them would cover what is read.
          isClinic &&
            'z-10 -mb-4 bg-sheet pb-4 @4xl/clinic:-mb-5 @4xl/clinic:pb-5 [@media(min-height:34em)]:sticky [@media(min-height:34em)]:bottom-0 @4xl/clinic:[@media(min-height:34em)]:-bottom-5',
        )}
      >
        {thread.state === 'closed' && readOnly === undefined ? (
          <p className="text-ink-soft">{t(`closed.${side}`)}</p>
        ) : null}
        {readOnly === undefined ? (
          <>
            {isClinic ? null : <OutOfHours clinic={clinic} />}
            <Composer
              threadId={thread.id}
              label={t(`composer.label.${side}`, { name: thread.patient.name })}
              messages={messages}
              onSent={() => setSentHere((count) => count + 1)}
            />
          </>
        ) : (
          <p className="font-bold">{readOnly}</p>
        )}
      </div>
    </article>
  );
}
