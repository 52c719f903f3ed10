import { useTranslation } from 'react-i18next';
import type { NotificationSettings } from '#shared/notifications/contract.ts';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { useTestChannel } from './queries.ts';
import type { TestedChannel } from './queries.ts';

/** Sends a test by each way that has somewhere to go to. */
export function Tests({ settings: { choices, phone } }: { settings: NotificationSettings }) {
  const { t } = useTranslation('notifications');
  const test = useTestChannel();
  const offered = (['email', 'sms', 'phone'] as const).filter(
    (channel) =>
      (channel === 'email' || phone !== null) && choices.some((choice) => choice.channel === channel),
  );
  if (offered.length === 0) return null;
  const sent: TestedChannel | null = test.isSuccess ? test.variables : null;
  return (
    <section aria-labelledby="tests" className="grid gap-3">
      <SectionHeading id="tests" wire>
        {t('tests.title')}
      </SectionHeading>
      <div className="flex flex-wrap gap-3">
        {offered.map((channel) => (
          <Button
            key={channel}
            variant="outline"
            busy={test.isPending && test.variables === channel}
            onClick={() => test.mutate(channel)}
          >
            {t(`tests.${channel}`)}
          </Button>
        ))}
      </div>
      <p role="status" className="empty:hidden">
        {sent === null ? null : t(`tests.sent.${sent}`)}
      </p>
      {test.isPending ? null : <AccountRefused error={test.error} />}
    </section>
  );
}
