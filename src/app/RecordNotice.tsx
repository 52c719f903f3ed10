import { CalendarClock } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { formatDate, formatWeekday, localDateOf } from '#src/lib/format.ts';
import { useRecord } from './caring.ts';
import { useMe } from './session.tsx';

/** On Today: what follows from the state of the record, and what somebody who looks after it may not do. */
export function RecordNotice({ surgeryDate }: { surgeryDate: string }) {
  const { state, caring } = useRecord();
  if (state === 'planned') return <BeforeSurgery surgeryDate={surgeryDate} />;
  return (
    <div className="mt-4 grid grid-cols-1 gap-4 empty:hidden">
      {state === 'paused' ? <Paused /> : null}
      {caring && state !== 'discharged' && state !== 'ended' ? <Limits /> : null}
    </div>
  );
}

function BeforeSurgery({ surgeryDate }: { surgeryDate: string }) {
  const { t } = useTranslation('record');
  const { caring } = useRecord();
  const date = `${formatWeekday(surgeryDate)} ${formatDate(surgeryDate)}`;
  const mayWrite = caring?.mayMessage !== false;
  return (
    <div className="mt-5 grid justify-items-start gap-4">
      <p className="flex items-start gap-3">
        <CalendarClock className="mt-0.5 size-7 shrink-0 text-bark" aria-hidden />
        <span className="min-w-0">
          <strong className="block text-lg">
            {caring ? t('surgery.titleCaring', { name: caring.name, date }) : t('surgery.title', { date })}
          </strong>
          {t(mayWrite ? 'surgery.body' : 'surgery.bodyOnly')}
        </span>
      </p>
      {mayWrite ? (
        <LinkButton to="/messages/new" size="large">
          {t('surgery.ask')}
        </LinkButton>
      ) : null}
    </div>
  );
}

function Paused() {
  const { t } = useTranslation('record');
  const { clinic } = useMe();
  const { stateSince } = useRecord();
  const title =
    stateSince === null
      ? t('paused.titlePlain')
      : t('paused.title', { date: formatDate(localDateOf(stateSince, clinic.timeZone)) });
  return (
    <Banner icon={CalendarClock} title={title}>
      {t('paused.body', { phone: clinic.phone })}
    </Banner>
  );
}

function Limits() {
  const { t } = useTranslation('record');
  const { caring } = useRecord();
  if (!caring || (caring.mayCheckIn && caring.mayMessage)) return null;
  const which = caring.mayCheckIn ? 'message' : caring.mayMessage ? 'checkIn' : 'both';
  return <p className="rounded bg-leaf-wash px-4 py-3">{t(`limits.${which}`, { name: caring.name })}</p>;
}
