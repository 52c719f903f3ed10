import { useTranslation } from 'react-i18next';
import type { Message } from '#shared/threads/contract.ts';
import { useMe } from '#src/app/session.tsx';
import { classNames } from '#src/components/class-names.ts';
import { formatTime } from '#src/lib/format.ts';
import type { SeenMark, Side } from './seen-mark.ts';

type Props = { message: Message; patientName: string; side: Side; seen: SeenMark | null };

/** Text is shown as it was typed and in its own direction, whatever stands around it. */
const asTyped = 'wrap-anywhere whitespace-pre-wrap [unicode-bidi:isolate]';

/** One's own side stands to the right. Notes of the system stand in the middle. */
export function MessageItem({ message, patientName, side, seen }: Props) {
  const { t } = useTranslation('threads');
  const { personId, clinic } = useMe();
  const { author, text, sentAt } = message;
  const time = formatTime(sentAt, clinic.timeZone);
  if (message.kind === 'note' || author === null) {
    return (
      <li className="mx-auto max-w-prose py-2 text-center text-sm text-ink-soft">
        <span className={asTyped}>{text}</span> <time dateTime={sentAt}>· {time}</time>
      </li>
    );
  }
  const isOurs = author.side === side;
  return (
    <li className={classNames('flex py-1.5', isOurs ? 'justify-end pl-8' : 'justify-start pr-8')}>
      <div
        className={classNames(
          'max-w-md min-w-0 rounded px-3.5 py-2.5 leading-snug forced-colors:border',
          isOurs ? 'rounded-br-none bg-leaf-wash' : 'rounded-bl-none bg-bark-wash',
        )}
      >
        <p dir="auto" className={asTyped}>
          {text}
        </p>
        <p className="mt-1.5 text-sm text-ink-soft">
          <bdi>{author.personId === personId ? t('thread.you') : author.name}</bdi>
          {author.relationship === undefined
            ? null
            : t(`thread.caregiver.${side}`, { relationship: author.relationship, name: patientName })}{' '}
          · <time dateTime={sentAt}>{time}</time>
          {seen?.sequence === message.sequence ? (
            <>
              {' · '}
              {t(`thread.seen.${side}`, { name: seen.by, time: formatTime(seen.at, clinic.timeZone) })}
            </>
          ) : null}
        </p>
      </div>
    </li>
  );
}
