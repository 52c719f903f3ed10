import type { ComponentProps } from 'react';
import { CheckMark } from './CheckMark.tsx';

type Props = Omit<ComponentProps<'input'>, 'className' | 'type'> & { label: string };

/** One line with a box; the words belong to the target. */
export function Checkbox({ label, ...rest }: Props) {
  return (
    <label className="flex min-h-target items-center gap-3 py-1">
      <CheckMark>
        <input {...rest} type="checkbox" className="peer sr-only" />
      </CheckMark>
      <span className="min-w-0">{label}</span>
    </label>
  );
}
