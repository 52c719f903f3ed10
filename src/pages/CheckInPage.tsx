import { useState } from 'react';
import { Trans, useTranslation } from 'react-i18next';
import { Navigate } from 'react-router-dom';
import type { CheckInMode } from '#shared/check-ins/screens.ts';
import { nextScreen } from '#shared/check-ins/walk.ts';
import { mayCheckIn, useKeeper, useRecord } from '#src/app/caring.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { CheckInFlow } from '#src/features/check-ins/CheckInFlow.tsx';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';
import { draftFrom, newDraft } from '#src/features/check-ins/draft.ts';
import { keptNames, storeOf } from '#src/features/check-ins/kept.ts';
import { useCheckInContext } from '#src/features/check-ins/context-query.ts';
import { readFromDevice } from '#src/lib/device-store.ts';
import { telephoneHref } from '#src/lib/format.ts';

export function CheckInPage() {
  return <Allowed mode="full" />;
}

/** The symptom part alone, at any hour. */
export function SomethingNewPage() {
  return <Allowed mode="something-new" />;
}

/** Today says why there is no check-in: before surgery, after the clinic stopped watching, or by the patient's word. */
function Allowed({ mode }: { mode: CheckInMode }) {
  return mayCheckIn(useRecord()) ? <Opening key={mode} mode={mode} /> : <Navigate to="/today" replace />;
}

/** Takes up the draft of today, or begins a new one with what the rules read besides the answers. */
function Opening({ mode }: { mode: CheckInMode }) {
  const { t } = useTranslation(['check-in-screens', 'app']);
  const me = useMe();
  const { recordId } = useKeeper();
  const heading = usePageHeading(t(`title.${mode}`));
  const context = useCheckInContext();
  const [start, setStart] = useState<CheckInDraft | null>(null);
  if (!start) {
    // What is loaded is taken when it is fresh; an older one only when nothing newer can be had.
    const usable = context.data && (context.isError || !context.isFetching) ? context.data : null;
    const kept = readFromDevice(storeOf(me, recordId), keptNames.draft[mode]);
    const draft = (usable ?? context.isError) ? draftFrom(kept, mode, usable?.date ?? null) : null;
    if (draft) setStart(draft);
    else if (usable) {
      const ask = { day: usable.day, precautionsInForce: usable.precautionsInForce };
      const first = nextScreen(null, {}, ask, mode);
      if (first) setStart(newDraft(mode, usable, first.id, crypto.randomUUID()));
    }
  }
  if (start) return <CheckInFlow start={start} firstName={me.name.split(' ')[0] ?? me.name} />;
  return (
    <main className="base-large mx-auto max-w-xl p-5">
      <PageHeader title={t(`title.${mode}`)} headingRef={heading} />
      {context.isError ? (
        <>
          <ErrorState
            title={t('failed.title')}
            retry={{
              label: t('app:tryAgain'),
              onRetry: () => void context.refetch(),
              busy: context.isFetching,
            }}
          >
            {t('failed.help')}
          </ErrorState>
          <p>
            <a
              href={telephoneHref(me.clinic.onCallNumber)}
              className="font-bold underline underline-offset-4"
            >
              <Trans
                t={t}
                i18nKey="failed.call"
                values={{ number: me.clinic.onCallNumber }}
                components={{ tel: <span className="whitespace-nowrap" /> }}
              />
            </a>
          </p>
        </>
      ) : (
        <LoadingState label={t('loading')} />
      )}
    </main>
  );
}
