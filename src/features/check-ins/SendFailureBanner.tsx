import { useTranslation } from 'react-i18next';
import type { Screen } from '#shared/check-ins/screens.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { sendFailureOf } from './send-failure.ts';

type Props = { error: Error; onFix: (screen: Screen) => void; onSendAsNew: () => void };

/** Says that nothing was sent and why, and leads to what can be done. The answers are kept in every case. */
export function SendFailureBanner({ error, onFix, onSendAsNew }: Props) {
  const { t } = useTranslation('check-in-screens');
  const failure = sendFailureOf(error);
  switch (failure.kind) {
    case 'unreachable':
      return <Banner tone="danger">{t('sendFailed.unreachable')}</Banner>;
    case 'refused':
      return <Banner tone="danger">{t('sendFailed.refused', { reason: failure.reason })}</Banner>;
    case 'already-sent':
      return (
        <Banner
          tone="warning"
          action={
            <Button variant="outline" onClick={onSendAsNew}>
              {t('sendFailed.prepareNew')}
            </Button>
          }
        >
          {t('sendFailed.alreadySent')}
        </Banner>
      );
    case 'invalid': {
      const { screen } = failure;
      return (
        <Banner
          tone="danger"
          action={
            screen && screen.kind !== 'note' ? (
              <Button variant="outline" onClick={() => onFix(screen)}>
                {t('sendFailed.fix')}
              </Button>
            ) : null
          }
        >
          {t('sendFailed.invalid')} {failure.message}
        </Banner>
      );
    }
  }
}
