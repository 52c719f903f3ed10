import { useQueryClient } from '@tanstack/react-query';
import { ChevronRight } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { safePlace } from '#src/app/home.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { hasCareEnded, openRecord } from '#src/app/other-record.ts';
import { useMe } from '#src/app/session.tsx';
import { SignOutButton } from '#src/app/shells/SignOutButton.tsx';
import { Avatar } from '#src/components/Avatar.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { BottomDock } from '#src/components/BottomDock.tsx';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { Mark } from '#src/components/Mark.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { formatDate, telephoneHref } from '#src/lib/format.ts';

/** Whose page somebody wants to see: their own, or that of a person they look after. */
export function CaringPage() {
  const { t } = useTranslation(['caring', 'app']);
  const me = useMe();
  const heading = usePageHeading(t('title'));
  const ended = hasCareEnded(me);
  const choices = [
    ...(me.patient ? [{ id: me.patient.id, name: t('own'), until: null }] : []),
    ...me.caresFor,
  ];
  return (
    <div className="base-large flex min-h-dvh flex-col">
      <main className="mx-auto grid w-full max-w-xl gap-6 px-5 pt-3 pb-10">
        <div className="flex min-h-target items-center">
          <Mark />
        </div>
        {ended ? (
          <Banner tone="warning" title={t('ended.title')} announce="status">
            {t('ended.body')}
          </Banner>
        ) : null}
        <PageHeader
          title={choices.length > 0 ? t('title') : t('nobody.title')}
          detail={choices.length > 0 ? t('detail') : undefined}
          headingRef={heading}
        />
        {choices.length > 0 ? (
          <ul className="grid gap-3">
            {choices.map(({ id, name, until }) => (
              <li key={id}>
                <Choice
                  recordId={id}
                  name={name}
                  detail={until === null ? null : t('until', { date: formatDate(until) })}
                />
              </li>
            ))}
          </ul>
        ) : (
          <EmptyState title={t('nobody.body')} />
        )}
        <SignOutButton />
      </main>
      <BottomDock>
        <EmergencyLine label={t('app:emergency.label')} href={telephoneHref(me.clinic.emergencyNumber)}>
          {t('app:emergency.line', { number: me.clinic.emergencyNumber })}
        </EmergencyLine>
      </BottomDock>
    </div>
  );
}

type ChoiceProps = { recordId: string; name: string; detail: string | null };

function Choice({ recordId, name, detail }: ChoiceProps) {
  const me = useMe();
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const [search] = useSearchParams();
  function open() {
    openRecord(queryClient, me, recordId);
    void navigate(safePlace(search.get('then')) ?? '/today', { replace: true });
  }
  return (
    <button
      type="button"
      onClick={open}
      className="flex min-h-18 w-full items-center gap-4 rounded border border-wire-strong bg-sheet px-4 py-3 text-left text-lg leading-snug font-bold hover:bg-leaf-wash"
    >
      <Avatar name={name} decorative />
      <span className="min-w-0 grow">
        <span className="block">{name}</span>
        {detail === null ? null : <span className="block text-base font-normal text-ink-soft">{detail}</span>}
      </span>
      <ChevronRight className="size-6 shrink-0" aria-hidden />
    </button>
  );
}
