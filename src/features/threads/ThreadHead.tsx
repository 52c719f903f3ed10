import { ArrowLeft, ArrowRight, Check } from 'lucide-react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import type { ThreadDetail } from '#shared/threads/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { classNames } from '#src/components/class-names.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { Wire } from '#src/components/Wire.tsx';
import { threadListPlace } from './places.ts';
import { useCloseThread } from './queries.ts';
import { useRefusal } from './refusal.ts';
import type { Side } from './seen-mark.ts';
import { ThreadTag } from './ThreadTag.tsx';

type Props = { thread: ThreadDetail; side: Side; headingRef: RefObject<HTMLHeadingElement | null> };

/** What the thread is about, who takes part, and what can be done with the whole of it. */
export function ThreadHead({ thread, side, headingRef }: Props) {
  const { t } = useTranslation('threads');
  const close = useCloseThread(thread.id);
  const refusal = useRefusal(close.error);
  const isClinic = side === 'clinic';
  const others = thread.participants.filter((person) => person.side === 'clinic').map(({ name }) => name);
  const withWhom = others.length > 0 ? t('thread.with', { names: others.join(', ') }) : null;
  const about = isClinic
    ? t('thread.about', { patient: thread.patient.name, day: thread.patient.day })
    : null;
  // A patient's page has this as its first heading; beside the clinic's list it stands below that.
  const Heading = isClinic ? 'h2' : 'h1';
  return (
    <header
      className={classNames(
        'mb-3',
        isClinic &&
          'z-10 bg-sheet @4xl/clinic:-mt-5 @4xl/clinic:pt-5 @4xl/clinic:[@media(min-height:34em)]:sticky @4xl/clinic:[@media(min-height:34em)]:-top-5',
      )}
    >
      <div className={isClinic ? '-ml-4 @4xl/clinic:hidden' : '-ml-4'}>
        <LinkButton to={threadListPlace(side)} variant="quiet" icon={ArrowLeft}>
          {t('thread.toList')}
        </LinkButton>
      </div>
      <div className="mb-3 flex flex-wrap items-start justify-between gap-x-6 gap-y-3">
        <div className="min-w-0 grow basis-60">
          <Heading ref={headingRef} tabIndex={-1} className="text-2xl leading-tight">
            <bdi dir="auto">{thread.subject}</bdi>
          </Heading>
          <p className="mt-1 text-ink-soft">{[about, withWhom].filter(Boolean).join(' · ')}</p>
          <p className="mt-1.5">
            <ThreadTag state={thread.state} side={side} />
          </p>
        </div>
        {isClinic ? (
          <div className="flex flex-wrap gap-3">
            {thread.flagId === null ? null : (
              <LinkButton to={`/round/${thread.flagId}`} variant="outline" iconAfter={ArrowRight}>
                {t('thread.openCase')}
              </LinkButton>
            )}
            {thread.state === 'closed' ? null : (
              <Button variant="outline" icon={Check} busy={close.isPending} onClick={() => close.mutate()}>
                {t('close.action')}
              </Button>
            )}
          </div>
        ) : null}
      </div>
      <p role="alert" className="font-bold text-clay">
        {refusal === null || close.isPending ? null : t('close.failed', { reason: refusal })}
      </p>
      <Wire />
    </header>
  );
}
