import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import type { ThreadSummary } from '#shared/threads/contract.ts';
import { useMe } from '#src/app/session.tsx';
import { Badge } from '#src/components/Badge.tsx';
import { classNames } from '#src/components/class-names.ts';
import { formatMoment } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';
import { threadPlace } from './places.ts';
import type { Side } from './seen-mark.ts';
import { ThreadTag } from './ThreadTag.tsx';

type Props = { thread: ThreadSummary; side: Side; selected: boolean };

/** One thread: for the clinic whose it is, then what it is about and what was said last. */
export function ThreadRow({ thread, side, selected }: Props) {
  const { t } = useTranslation('threads');
  const { clinic } = useMe();
  const nowMs = useNowMs();
  const { subject, patient, state, unseen } = thread;
  return (
    <li
      aria-current={selected ? 'true' : undefined}
      className={classNames(
        'relative flex flex-wrap gap-x-4 gap-y-1 border-b border-l-3 border-wire py-3.5 leading-snug',
        'has-focus-visible:outline-3 has-focus-visible:-outline-offset-3 has-focus-visible:outline-focus',
        side === 'clinic' ? 'pr-5 pl-4' : 'px-3',
        selected ? 'border-l-leaf bg-sheet' : 'border-l-transparent hover:bg-bark-wash',
      )}
    >
      <div className="min-w-0 grow basis-40 wrap-anywhere">
        <Link
          to={threadPlace(side, thread.id)}
          className="after:absolute after:inset-0 focus-visible:outline-none"
        >
          {side === 'clinic' ? (
            <>
              <span className="font-black">{patient.name}</span>
              <span className="text-sm text-ink-soft"> · {t('list.day', { day: patient.day })}</span>
              <span className="sr-only">: </span>
            </>
          ) : null}
          <bdi dir="auto" className={classNames('font-bold', side === 'clinic' && 'mt-0.5 block')}>
            {subject}
          </bdi>
        </Link>
        <p dir="auto" className="mt-0.5 line-clamp-2 text-ink-soft [unicode-bidi:isolate]">
          {thread.lastText}
        </p>
      </div>
      <div className="ml-auto grid content-start justify-items-end gap-1.5 text-sm text-ink-soft">
        <time dateTime={thread.lastAt}>{formatMoment(thread.lastAt, nowMs, clinic.timeZone)}</time>
        <ThreadTag state={state} side={side} />
        <Badge count={unseen} label={t('list.unseen', { count: unseen })} />
      </div>
    </li>
  );
}
