import type { LucideIcon } from 'lucide-react';
import type { ComponentProps } from 'react';
import { classNames } from './class-names.ts';

type Props = Omit<ComponentProps<'button'>, 'className' | 'children' | 'aria-pressed'> & {
  label: string;
  detail?: string;
  icon?: LucideIcon;
  picked: boolean;
};

/** One of several answers, given by a single press; a group of them needs a name of its own. */
export function ChoiceTile({ label, detail, icon: Icon, picked, type = 'button', ...rest }: Props) {
  return (
    <button
      {...rest}
      type={type}
      aria-pressed={picked}
      className={classNames(
        'flex min-h-15 w-full items-center gap-3.5 rounded border px-4 py-2.5 text-left leading-snug',
        picked ? 'picked font-bold' : 'border-wire-strong bg-sheet hover:bg-leaf-wash',
      )}
    >
      {Icon ? <Icon className="size-6 shrink-0" aria-hidden /> : null}
      <span className="min-w-0">
        <span className="block">{label}</span>
        {detail ? (
          <span className={classNames('block text-sm font-normal', picked ? 'text-sheet' : 'text-ink-soft')}>
            {detail}
          </span>
        ) : null}
      </span>
    </button>
  );
}
