import { BellOff, BellRing } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { useNowMs } from '#src/lib/now.ts';
import { formatMoment, telephoneHref } from '#src/lib/format.ts';
import { isReceived } from './alert-outbox.ts';
import type { OutgoingAlert } from './alert-outbox.ts';
import { useAlertReceipt } from './queries.ts';

/** After this long without the server's word the on-call number stands large. */
const patienceMs = 20_000;

type Props = { entry: OutgoingAlert | undefined; alertId: string; onCallNumber: string };

/** The truth about the clinic: not sent, sent and when, seen by whom and when. Only what is recorded. */
export function AlertStatus({ entry, alertId, onCallNumber }: Props) {
  const { t } = useTranslation('check-in-screens');
  const nowMs = useNowMs(1_000);
  const received = entry === undefined || isReceived(entry);
  const latest = useAlertReceipt(alertId, received);
  const receipt = latest.data ?? entry?.receipt ?? null;
  const late = receipt === null && entry !== undefined && nowMs - entry.tickedAtMs >= patienceMs;
  const Icon = receipt ? BellRing : BellOff;
  return (
    <section aria-label={t('clinic.label')} className="grid gap-3">
      <p role="status" className="flex items-start gap-3">
        <Icon className="mt-0.5 size-7 shrink-0" aria-hidden />
        <span className="min-w-0">
          {receipt ? (
            <>
              <strong>{t('clinic.sent', { time: formatMoment(receipt.receivedAt, nowMs) })}</strong>{' '}
              {receipt.seen
                ? t('clinic.seen', {
                    name: receipt.seen.by,
                    time: formatMoment(receipt.seen.at, nowMs),
                  })
                : t('clinic.unseen')}
            </>
          ) : (
            <>
              <strong>{t('clinic.notSent')}</strong>{' '}
              {t(entry?.refused ? 'clinic.refused' : 'clinic.notSentHelp')}
            </>
          )}
        </span>
      </p>
      {late || entry?.refused ? (
        <div role="alert" className="grid gap-2">
          <p className="font-bold">{t('clinic.callInstead')}</p>
          <LinkButton href={telephoneHref(onCallNumber)} variant="danger" size="large" block>
            <span className="text-2xl whitespace-nowrap tabular-nums">{onCallNumber}</span>
          </LinkButton>
        </div>
      ) : null}
    </section>
  );
}
