import { KeyRound } from 'lucide-react';
import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { formatDateAndYear, formatMoment, localDateOf } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';
import { passkeysSupported, preloadPasskeys } from '#src/lib/passkeys.ts';
import { ActResult } from './ActResult.tsx';
import { useRefusal } from './refusal.ts';
import { useAddPasskey, useRemovePasskey } from './ways-in-queries.ts';
import { WaysInSection } from './WaysInSection.tsx';

type Passkey = WaysIn['passkeys'][number];

/** The passkeys of one's own, on whichever devices they live. */
export function PasskeysSection({ waysIn }: { waysIn: WaysIn }) {
  const { t } = useTranslation('accounts');
  const [removing, setRemoving] = useState<Passkey | null>(null);
  const add = useAddPasskey();
  const remove = useRemovePasskey();
  const refusal = useRefusal(add.error ?? remove.error, { passkey: 'add' });
  const supported = passkeysSupported();
  useEffect(preloadPasskeys, []);
  const done = add.isSuccess
    ? t('waysIn.passkeys.added')
    : remove.isSuccess
      ? t('waysIn.passkeys.removed')
      : null;
  return (
    <WaysInSection title={t('waysIn.passkeys.title')}>
      {waysIn.passkeys.length === 0 ? (
        <p>{t('waysIn.passkeys.none')}</p>
      ) : (
        <ul>
          {waysIn.passkeys.map((passkey) => (
            <PasskeyRow key={passkey.id} passkey={passkey} onRemove={() => setRemoving(passkey)} />
          ))}
        </ul>
      )}
      <ActResult done={done} refusal={refusal} />
      <div>
        {supported ? (
          <Button
            variant="outline"
            icon={KeyRound}
            busy={add.isPending}
            onClick={() => {
              remove.reset();
              add.mutate();
            }}
          >
            {t('waysIn.passkeys.add')}
          </Button>
        ) : (
          <p className="text-ink-soft">{t('waysIn.passkeys.unsupported')}</p>
        )}
      </div>
      <AlertDialog
        open={removing !== null}
        onOpenChange={(open) => {
          if (!open) setRemoving(null);
        }}
        title={t('waysIn.passkeys.confirmTitle')}
        description={t('waysIn.passkeys.confirmBody', { name: removing?.name })}
        cancelLabel={t('waysIn.passkeys.keep')}
        confirm={{
          label: t('waysIn.passkeys.remove'),
          danger: true,
          onConfirm: () => {
            add.reset();
            if (removing) remove.mutate(removing.id);
            // It makes room for the question who acts; what came of it is said below the list.
            setRemoving(null);
          },
        }}
      />
    </WaysInSection>
  );
}

function PasskeyRow({ passkey, onRemove }: { passkey: Passkey; onRemove: () => void }) {
  const { t } = useTranslation('accounts');
  const nowMs = useNowMs();
  const { name, createdAt, lastUsedAt } = passkey;
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 border-b border-wire py-2">
      <div className="min-w-0 grow basis-48">
        <p className="font-bold wrap-anywhere">{name}</p>
        <p className="text-sm text-ink-soft">
          {t('waysIn.passkeys.made', { date: formatDateAndYear(localDateOf(createdAt)) })}{' '}
          {lastUsedAt
            ? t('waysIn.passkeys.used', { date: formatMoment(lastUsedAt, nowMs) })
            : t('waysIn.passkeys.neverUsed')}
        </p>
      </div>
      <Button variant="quiet" aria-label={t('waysIn.passkeys.removeNamed', { name })} onClick={onRemove}>
        {t('waysIn.passkeys.remove')}
      </Button>
    </li>
  );
}
