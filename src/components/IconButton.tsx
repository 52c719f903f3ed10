import type { LucideIcon } from 'lucide-react';
import type { ComponentProps } from 'react';

type Props = Omit<ComponentProps<'button'>, 'className' | 'children' | 'aria-label'> & {
  icon: LucideIcon;
  /** The accessible name, also shown as a tooltip. */
  label: string;
};

/** A button with a picture only: for actions whose picture everybody knows (back, close). */
export function IconButton({ icon: Icon, label, type = 'button', ...rest }: Props) {
  return (
    <button
      {...rest}
      type={type}
      aria-label={label}
      title={label}
      className="inline-grid size-target shrink-0 place-items-center rounded text-ink hover:bg-leaf-wash disabled:text-ink-soft"
    >
      <Icon className="size-6" aria-hidden />
    </button>
  );
}
