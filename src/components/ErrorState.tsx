import { RotateCw, TriangleAlert } from 'lucide-react';
import type { ReactNode } from 'react';
import { Button } from './Button.tsx';

type Props = {
  title: string;
  /** What to do now, in words. */
  children?: ReactNode;
  retry?: { label: string; onRetry: () => void; busy?: boolean };
  /** A number to read out on the telephone, with the word before it. */
  reference?: { label: string; id: string };
};

/** Says what failed and what to do; announced at once. */
export function ErrorState({ title, children, retry, reference }: Props) {
  return (
    <div role="alert" className="grid justify-items-start gap-2 py-6">
      <p className="flex items-start gap-2.5 text-lg font-bold">
        <TriangleAlert className="mt-0.5 size-6 shrink-0 text-ochre" aria-hidden />
        <span className="min-w-0">{title}</span>
      </p>
      {children ? <div className="max-w-prose text-ink-soft">{children}</div> : null}
      {retry ? (
        <div className="mt-2">
          <Button variant="outline" icon={RotateCw} busy={retry.busy} onClick={retry.onRetry}>
            {retry.label}
          </Button>
        </div>
      ) : null}
      {reference ? (
        <p className="text-sm text-ink-soft">
          {reference.label} <span className="font-mono break-all select-all">{reference.id}</span>
        </p>
      ) : null}
    </div>
  );
}
