import { useId } from 'react';
import type { ComponentProps } from 'react';
import { CheckMark } from './CheckMark.tsx';

type Props = Omit<ComponentProps<'input'>, 'className' | 'type' | 'aria-describedby'> & {
  label: string;
  /** Examples or an explanation under the label. */
  detail?: string;
};

/** A large tile to tick, one of several that may be true together. */
export function CheckTile({ label, detail, ...rest }: Props) {
  const detailId = useId();
  const labelId = useId();
  return (
    <label className="flex min-h-13 items-center gap-3.5 rounded border border-wire-strong bg-sheet px-3.5 py-1.5 leading-snug hover:bg-leaf-wash has-disabled:bg-transparent has-disabled:text-ink-soft has-checked:border-leaf has-checked:bg-leaf-wash has-checked:ring-1 has-checked:ring-leaf">
      <CheckMark large>
        <input
          {...rest}
          type="checkbox"
          className="peer sr-only"
          aria-labelledby={labelId}
          aria-describedby={detail ? detailId : undefined}
        />
      </CheckMark>
      <span className="min-w-0">
        <span id={labelId} className="block">
          {label}
        </span>
        {detail ? (
          <span id={detailId} className="block text-sm text-ink-soft">
            {detail}
          </span>
        ) : null}
      </span>
    </label>
  );
}
