import { LoaderCircle } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import type { ComponentProps, MouseEvent } from 'react';
import { ButtonContent } from './ButtonContent.tsx';
import { classNames } from './class-names.ts';
import { buttonClass } from './button-style.ts';
import type { ButtonLook } from './button-style.ts';

type Props = Omit<ComponentProps<'button'>, 'className'> &
  ButtonLook & {
    icon?: LucideIcon;
    iconAfter?: LucideIcon;
    /** Work is under way: the button keeps its width, its name and the focus, and does nothing when pressed. */
    busy?: boolean;
  };

export function Button({
  variant,
  size,
  block,
  icon,
  iconAfter,
  busy = false,
  type = 'button',
  onClick,
  children,
  ...rest
}: Props) {
  function handleClick(event: MouseEvent<HTMLButtonElement>) {
    // Preventing the click also keeps a submit button from sending its form a second time.
    if (busy) event.preventDefault();
    else onClick?.(event);
  }
  return (
    <button
      {...rest}
      type={type}
      className={buttonClass({ variant, size, block })}
      onClick={handleClick}
      aria-busy={busy || undefined}
      aria-disabled={busy || rest['aria-disabled']}
    >
      <span className={classNames('flex min-w-0', busy && 'opacity-0')}>
        <ButtonContent icon={icon} iconAfter={iconAfter}>
          {children}
        </ButtonContent>
      </span>
      {busy ? (
        <span className="absolute inset-0 grid place-items-center" aria-hidden>
          <LoaderCircle className="size-[1.5em] motion-safe:animate-spin" />
        </span>
      ) : null}
    </button>
  );
}
