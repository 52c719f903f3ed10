import { LoaderCircle } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';

type Props = { label: string; detail: string; icon: LucideIcon; busy: boolean; onClick: () => void };

/** A choice that goes straight on. It has no picked state: nothing is chosen before it is pressed. */
export function DeviceTile({ label, detail, icon: Icon, busy, onClick }: Props) {
  return (
    <button
      type="button"
      onClick={onClick}
      aria-busy={busy || undefined}
      className="flex min-h-20 w-full items-center gap-4 rounded border border-wire-strong bg-sheet px-4 py-3 text-left leading-snug hover:bg-leaf-wash"
    >
      {busy ? (
        <LoaderCircle className="size-8 shrink-0 text-leaf motion-safe:animate-spin" aria-hidden />
      ) : (
        <Icon className="size-8 shrink-0 text-leaf" strokeWidth={1.75} aria-hidden />
      )}
      <span className="min-w-0">
        <span className="block text-lg font-bold">{label}</span>
        <span className="block text-sm text-ink-soft">{detail}</span>
      </span>
    </button>
  );
}
