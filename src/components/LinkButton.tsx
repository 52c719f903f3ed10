import type { LucideIcon } from 'lucide-react';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { ButtonContent } from './ButtonContent.tsx';
import { buttonClass } from './button-style.ts';
import type { ButtonLook } from './button-style.ts';

type Target =
  /** A place inside the application. */
  | { to: string; href?: never }
  /** A telephone number, a mail address or a file. */
  | { href: string; to?: never };

type Props = ButtonLook & Target & { icon?: LucideIcon; iconAfter?: LucideIcon; children: ReactNode };

/** A link that looks like a button: it goes somewhere, where a button does something. */
export function LinkButton({ to, href, icon, iconAfter, children, ...look }: Props) {
  const content = (
    <ButtonContent icon={icon} iconAfter={iconAfter}>
      {children}
    </ButtonContent>
  );
  const className = buttonClass(look);
  return to === undefined ? (
    <a href={href} className={className}>
      {content}
    </a>
  ) : (
    <Link to={to} className={className}>
      {content}
    </Link>
  );
}
