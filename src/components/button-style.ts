import { classNames } from './class-names.ts';

type ButtonVariant = 'primary' | 'outline' | 'quiet' | 'danger' | 'danger-outline';
type ButtonSize = 'normal' | 'large';

export type ButtonLook = {
  variant?: ButtonVariant;
  size?: ButtonSize;
  /** As wide as its container. */
  block?: boolean;
};

const variants: Record<ButtonVariant, string> = {
  primary: 'border-leaf bg-leaf text-sheet hover:border-leaf-deep hover:bg-leaf-deep',
  outline: 'border-wire-strong text-ink hover:bg-leaf-wash',
  quiet: 'border-transparent text-leaf hover:bg-leaf-wash hover:text-leaf-deep',
  danger: 'border-clay bg-clay text-sheet hover:brightness-90',
  'danger-outline': 'border-clay text-clay hover:bg-sheet',
};

const sizes: Record<ButtonSize, string> = {
  normal: 'min-h-target px-4 py-2',
  large: 'min-h-15 px-5 py-3 text-lg',
};

/** The look shared by buttons and by links that look like buttons. */
export function buttonClass({ variant = 'primary', size = 'normal', block = false }: ButtonLook): string {
  return classNames(
    'relative inline-flex max-w-full items-center justify-center rounded border font-bold',
    'disabled:border-wire disabled:bg-bark-wash disabled:text-ink-soft disabled:brightness-100',
    variant === 'danger-outline' && 'border-2',
    variants[variant],
    sizes[size],
    block && 'w-full',
  );
}
