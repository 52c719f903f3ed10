import { useTranslation } from 'react-i18next';
import type { ActivityLine } from '#shared/caregivers/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatDate, formatTime, formatWeekday, localDateOf } from '#src/lib/format.ts';
import { byDay } from './days.ts';

type Props = { lines: readonly ActivityLine[]; nowMs: number };

/** Day by day, the newest first: when, who, what, and why where it was outside the care team. */
export function ActivityDays({ lines, nowMs }: Props) {
  const { t } = useTranslation('activity');
  const today = localDateOf(nowMs);
  const yesterday = localDateOf(nowMs - 86_400_000);
  const nameOf = (date: string): string => {
    if (date === today) return t('today');
    if (date === yesterday) return t('yesterday');
    return `${formatWeekday(date)} ${formatDate(date)}`;
  };
  return byDay(lines).map(({ date, lines: ofDay }) => (
    <section key={date} aria-labelledby={`day-${date}`}>
      <SectionHeading id={`day-${date}`} wire>
        {nameOf(date)}
      </SectionHeading>
      <ul>
        {ofDay.map((line) => (
          <Line key={line.id} line={line} />
        ))}
      </ul>
    </section>
  ));
}

function Line({ line: { at, who, as, what, reason } }: { line: ActivityLine }) {
  const { t, i18n } = useTranslation('activity');
  const words = (group: 'what' | 'why', code: string, otherwise: string) =>
    i18n.exists(`activity:${group}.${code}`) ? t(`${group}.${code}`) : otherwise;
  return (
    <li className="grid grid-cols-[4rem_minmax(0,1fr)] gap-x-3 border-b border-wire py-3 leading-snug last:border-b-0">
      <time dateTime={at} className="text-ink-soft tabular-nums">
        {formatTime(at)}
      </time>
      <div className="min-w-0">
        <p>
          <bdi className="font-bold">{as === 'you' ? t('as.you') : who}</bdi>{' '}
          {as === 'you' || as === 'system' ? null : <span className="text-ink-soft">({t(`as.${as}`)})</span>}
        </p>
        <p>{words('what', what, t('what.other'))}</p>
        {reason === null ? null : (
          <p className="text-ink-soft">
            {t('reason')} <bdi>{words('why', reason, reason)}</bdi>
          </p>
        )}
      </div>
    </li>
  );
}
