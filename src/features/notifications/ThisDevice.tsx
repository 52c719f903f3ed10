import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { pushAbility } from '#src/app/push.ts';
import { useMe } from '#src/app/session.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { useDevices, useTurnOff, useTurnOn } from './queries.ts';

/** Whether this browser may be woken, the way to change it, and what stands in the way. Asks only on a press. */
export function ThisDevice() {
  const { t } = useTranslation('notifications');
  const { personId } = useMe();
  const devices = useDevices();
  const turnOn = useTurnOn();
  const turnOff = useTurnOff();
  // Read anew after the browser's own question, whose answer changes it.
  const [ability, setAbility] = useState(pushAbility);
  const current = devices.data?.current ?? null;
  if (ability !== 'able') {
    return <Banner title={t(`device.${ability}.title`)}>{t(`device.${ability}.help`)}</Banner>;
  }
  const busy = turnOn.isPending || turnOff.isPending;
  return (
    <div className="grid justify-items-start gap-3">
      <p role="status">{devices.data ? t(current ? 'device.on' : 'device.off') : null}</p>
      {current ? (
        <Button variant="outline" busy={busy} onClick={() => turnOff.mutate(current.id)}>
          {t('device.turnOff')}
        </Button>
      ) : (
        <Button
          busy={busy}
          onClick={() => turnOn.mutate(personId, { onSettled: () => setAbility(pushAbility()) })}
        >
          {t('device.turnOn')}
        </Button>
      )}
      {turnOn.data === false ? <p role="alert">{t('device.notAllowed')}</p> : null}
      {busy ? null : <AccountRefused error={turnOn.error ?? turnOff.error} />}
    </div>
  );
}
