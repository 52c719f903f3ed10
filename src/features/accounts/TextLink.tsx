import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';

/** A way out of a step, below its button, large enough for a thumb. */
export function TextLink({ to, children }: { to: string; children: ReactNode }) {
  return (
    <Link
      to={to}
      className="inline-flex min-h-target items-center text-leaf underline underline-offset-4 hover:text-leaf-deep"
    >
      {children}
    </Link>
  );
}
