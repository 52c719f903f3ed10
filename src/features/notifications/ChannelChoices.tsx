import { useTranslation } from 'react-i18next';
import type { NotificationSettings } from '#shared/notifications/contract.ts';
import { CheckTile } from '#src/components/CheckTile.tsx';

export type Choice = NotificationSettings['choices'][number];

type Props = {
  choices: readonly Choice[];
  /** A text or a call needs a number. */
  hasPhone: boolean;
  onChange: (choices: Choice[]) => void;
};

/** For each kind of word, the ways it may come. What cannot be turned off says why. */
export function ChannelChoices({ choices, hasPhone, onChange }: Props) {
  const { t } = useTranslation('notifications');
  const kinds = [...new Set(choices.map(({ kind }) => kind))];
  function detailOf({ channel, locked }: Choice): string | undefined {
    if (locked) return t('choices.locked');
    return (channel === 'sms' || channel === 'phone') && !hasPhone ? t('choices.needsPhone') : undefined;
  }
  const turn = (turned: Choice, enabled: boolean) =>
    onChange(choices.map((choice) => (choice === turned ? { ...choice, enabled } : choice)));
  return kinds.map((kind) => (
    <fieldset key={kind} className="grid min-w-0 gap-2">
      <legend className="mb-2 font-bold">{t(`kinds.${kind}`)}</legend>
      {choices
        .filter((choice) => choice.kind === kind)
        .map((choice) => (
          <CheckTile
            key={choice.channel}
            label={t(`channels.${choice.channel}`)}
            detail={detailOf(choice)}
            checked={choice.enabled}
            disabled={choice.locked}
            onChange={(event) => turn(choice, event.target.checked)}
          />
        ))}
    </fieldset>
  ));
}
