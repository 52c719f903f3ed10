import { ArrowRight } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { AloneChoice } from '#shared/check-ins/screens.ts';
import { Button } from '#src/components/Button.tsx';
import { ChoiceTile } from '#src/components/ChoiceTile.tsx';

type Props = { alone: AloneChoice; picked: boolean; disabled: boolean; onPick: () => void };

/**
 * "None of these" stands after the list as the way on, so that the list is read first; "as advised" stands
 * before it as one of the answers. Neither can be pressed while something in the list is ticked.
 */
export function AloneButton({ alone, picked, disabled, onPick }: Props) {
  const { t } = useTranslation('check-in');
  const words = t(alone.textKey);
  return alone.place === 'first' ? (
    <ChoiceTile label={words} picked={picked} disabled={disabled} onClick={onPick} />
  ) : (
    <Button
      size="large"
      block
      iconAfter={ArrowRight}
      disabled={disabled}
      aria-pressed={picked}
      onClick={onPick}
    >
      {words}
    </Button>
  );
}
