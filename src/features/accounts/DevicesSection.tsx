import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { listSessions } from '#shared/accounts/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { Tag } from '#src/components/Tag.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';
import { ActResult } from './ActResult.tsx';
import { useRefusal } from './refusal.ts';
import { useEndOtherSessions, useEndSession, useSessions } from './ways-in-queries.ts';
import { WaysInSection } from './WaysInSection.tsx';

type Session = OutputOf<typeof listSessions>['sessions'][number];

/** Where one is signed in, and the way to end it there. */
export function DevicesSection() {
  const { t } = useTranslation(['accounts', 'app']);
  const sessions = useSessions();
  const [asking, setAsking] = useState(false);
  const [done, setDone] = useState<string | null>(null);
  const end = useEndSession();
  const endOthers = useEndOtherSessions();
  const refusal = useRefusal(end.error ?? endOthers.error);
  const list = sessions.data?.sessions;
  function endOne({ id, device }: Session) {
    setDone(null);
    endOthers.reset();
    end.mutate(id, { onSuccess: () => setDone(t('waysIn.devices.ended', { device })) });
  }
  function endAllOthers() {
    setAsking(false);
    setDone(null);
    end.reset();
    endOthers.mutate(undefined, {
      onSuccess: ({ ended }) => setDone(t('waysIn.devices.endedOthers', { count: ended })),
    });
  }
  return (
    <WaysInSection title={t('waysIn.devices.title')}>
      {list ? (
        <ul>
          {list.map((session) => (
            <DeviceRow
              key={session.id}
              session={session}
              busy={end.isPending && end.variables === session.id}
              onEnd={() => endOne(session)}
            />
          ))}
        </ul>
      ) : sessions.isError ? (
        <ErrorState
          title={t('waysIn.devices.failed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void sessions.refetch(),
            busy: sessions.isFetching,
          }}
        />
      ) : (
        <LoadingState label={t('waysIn.devices.loading')} lines={2} />
      )}
      <ActResult done={done} refusal={refusal} />
      {list && list.length > 1 ? (
        <div>
          <Button variant="outline" busy={endOthers.isPending} onClick={() => setAsking(true)}>
            {t('waysIn.devices.endOthers')}
          </Button>
        </div>
      ) : null}
      {list?.length === 1 ? <p className="text-ink-soft">{t('waysIn.devices.onlyThis')}</p> : null}
      <AlertDialog
        open={asking}
        onOpenChange={setAsking}
        title={t('waysIn.devices.endOthersTitle')}
        description={t('waysIn.devices.endOthersBody')}
        cancelLabel={t('waysIn.devices.keep')}
        confirm={{ label: t('waysIn.devices.endOthers'), onConfirm: endAllOthers }}
      />
    </WaysInSection>
  );
}

type RowProps = { session: Session; busy: boolean; onEnd: () => void };

function DeviceRow({ session, busy, onEnd }: RowProps) {
  const { t } = useTranslation('accounts');
  const nowMs = useNowMs();
  const { device, startedAt, lastActivityAt, current, staysSignedIn, push } = session;
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 border-b border-wire py-2">
      <div className="min-w-0 grow basis-48">
        <p className="flex flex-wrap items-center gap-2 font-bold">
          <span className="wrap-anywhere">{device}</span>
          {current ? <Tag tone="leaf">{t('waysIn.devices.this')}</Tag> : null}
        </p>
        <p className="text-sm text-ink-soft">
          {t('waysIn.devices.active', { time: formatMoment(lastActivityAt, nowMs) })}{' '}
          {t('waysIn.devices.since', { time: formatMoment(startedAt, nowMs) })}{' '}
          {staysSignedIn ? t('waysIn.devices.stays') : null} {push ? t('waysIn.devices.push') : null}
        </p>
      </div>
      {current ? null : (
        <Button
          variant="quiet"
          busy={busy}
          aria-label={t('waysIn.devices.endNamed', { device })}
          onClick={onEnd}
        >
          {t('waysIn.devices.end')}
        </Button>
      )}
    </li>
  );
}
