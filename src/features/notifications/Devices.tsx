import { useTranslation } from 'react-i18next';
import type { listPushSubscriptions } from '#shared/notifications/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { Button } from '#src/components/Button.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { Tag } from '#src/components/Tag.tsx';
import { formatDate, localDateOf } from '#src/lib/format.ts';
import { useDevices, useRemoveDevice, useTestDevice, useTurnOff } from './queries.ts';
import { ThisDevice } from './ThisDevice.tsx';

type Device = OutputOf<typeof listPushSubscriptions>['subscriptions'][number];

/** The browsers that may be woken: this one first, then all of them with a test for each. */
export function Devices() {
  const { t } = useTranslation(['notifications', 'app', 'account']);
  const devices = useDevices();
  const list = devices.data?.subscriptions ?? [];
  return (
    <section aria-labelledby="devices" className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHeading id="devices" wire>
        {t('device.title')}
      </SectionHeading>
      <ThisDevice />
      {devices.isError && !devices.data ? (
        <ErrorState
          title={t('account:loadFailed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void devices.refetch(),
            busy: devices.isFetching,
          }}
        />
      ) : null}
      {list.length > 0 ? (
        <ul aria-label={t('device.list')} className="border-t border-wire">
          {list.map((device) => (
            <DeviceRow key={device.id} device={device} isHere={device.id === devices.data?.current?.id} />
          ))}
        </ul>
      ) : null}
    </section>
  );
}

function DeviceRow({ device, isHere }: { device: Device; isHere: boolean }) {
  const { t } = useTranslation('notifications');
  const { id, deviceName, createdAt } = device;
  const test = useTestDevice();
  const remove = useRemoveDevice();
  const turnOff = useTurnOff();
  // Of this browser its own side goes too.
  const removal = isHere ? turnOff : remove;
  return (
    <li className="grid gap-2 border-b border-wire py-3">
      <p className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <span className="font-bold">{deviceName}</span>
        {isHere ? <Tag tone="leaf">{t('device.here')}</Tag> : null}
        <span className="text-ink-soft">
          {t('device.since', { date: formatDate(localDateOf(createdAt)) })}
        </span>
      </p>
      <div className="flex flex-wrap gap-3">
        <Button
          variant="outline"
          aria-label={t('device.testNamed', { name: deviceName })}
          busy={test.isPending}
          onClick={() => test.mutate(id)}
        >
          {t('device.test')}
        </Button>
        <Button
          variant="quiet"
          aria-label={t('device.removeNamed', { name: deviceName })}
          busy={removal.isPending}
          onClick={() => removal.mutate(id)}
        >
          {t('device.remove')}
        </Button>
      </div>
      <p role="status" className="empty:hidden">
        {test.isSuccess ? t('device.tested') : null}
      </p>
      <AccountRefused error={test.error ?? removal.error} />
    </li>
  );
}
