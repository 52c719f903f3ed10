import { ClipboardCheck, MessageCircleMore } from 'lucide-react';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { classNames } from '#src/components/class-names.ts';
import { formatTime } from '#src/lib/format.ts';

type Props = {
  /** When today's check-in was sent, if it was. */
  doneAt: string | null;
  /** What is begun and not sent. */
  begun: { checkIn: boolean; somethingNew: boolean };
  side: 'left' | 'right';
  /** What became of what was told before stands ahead of telling more. */
  children?: ReactNode;
};

/** The way into the check-in, and at any hour into the symptom part alone. */
export function CheckInEntry({ doneAt, begun, side, children }: Props) {
  const { t } = useTranslation('today');
  // On a phone the buttons are as wide as the screen; where they are not, they stand on the free hand's side.
  const place = classNames('grid grid-cols-1 sm:max-lg:w-80', side === 'right' && 'sm:max-lg:ml-auto');
  return (
    <div className="grid grid-cols-1 gap-3 lg:w-70 lg:shrink-0">
      {doneAt === null ? (
        <div className={place}>
          <LinkButton to="/check-in" size="large" block icon={ClipboardCheck}>
            {t(begun.checkIn ? 'checkIn.goOn' : 'checkIn.start')}
          </LinkButton>
          <p className="mt-1.5 text-center text-ink-soft">
            {t(begun.checkIn ? 'checkIn.kept' : 'checkIn.aboutOneMinute')}
          </p>
        </div>
      ) : (
        <p className="flex items-center gap-3 rounded bg-leaf-wash px-4 py-3 font-bold">
          <ClipboardCheck className="size-6 shrink-0 text-leaf" aria-hidden />
          {t('checkIn.done', { time: formatTime(doneAt) })}
        </p>
      )}
      {children}
      <div className={place}>
        <LinkButton to="/something-new" variant="outline" block icon={MessageCircleMore}>
          {t(begun.somethingNew ? 'checkIn.goOnSomethingNew' : 'checkIn.somethingNew')}
        </LinkButton>
        <p className="mt-1.5 text-center text-sm text-ink-soft">{t('checkIn.somethingNewHelp')}</p>
      </div>
    </div>
  );
}
