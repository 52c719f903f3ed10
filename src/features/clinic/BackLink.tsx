import { ArrowLeft } from 'lucide-react';
import { LinkButton } from '#src/components/LinkButton.tsx';

/** To the page above, at the head of one below it. */
export function BackLink({ to, children }: { to: string; children: string }) {
  return (
    <div className="-mb-4 -ml-4 print:hidden">
      <LinkButton to={to} variant="quiet" icon={ArrowLeft}>
        {children}
      </LinkButton>
    </div>
  );
}
