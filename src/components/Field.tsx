import type { ReactNode } from 'react';

export type FieldText = {
  label: string;
  hint?: ReactNode;
  /** What is wrong and how to put it right, in words; shown beside the field and read with it. */
  error?: string;
};

type Props = FieldText & { id: string; children: ReactNode };

/** The ids that describe a field, in the order in which they are to be read: what is wrong comes first. */
export function describedBy(
  id: string,
  { hint, error }: Pick<FieldText, 'hint' | 'error'>,
): string | undefined {
  const ids = [error && `${id}-error`, hint && `${id}-hint`].filter(Boolean);
  return ids.length > 0 ? ids.join(' ') : undefined;
}

/** The border, ground and size that every typed field shares. */
export const fieldClass =
  'block w-full rounded border border-wire-strong bg-sheet px-3.5 py-2.5 text-ink min-h-target ' +
  'aria-invalid:border-2 aria-invalid:border-clay disabled:bg-bark-wash disabled:text-ink-soft';

/** Label above, then hint, control and error. */
export function Field({ id, label, hint, error, children }: Props) {
  return (
    <div className="grid gap-1.5">
      <label htmlFor={id} className="font-bold">
        {label}
      </label>
      {hint ? (
        <p id={`${id}-hint`} className="text-sm text-ink-soft">
          {hint}
        </p>
      ) : null}
      {children}
      {error ? (
        <p id={`${id}-error`} className="flex items-start gap-2 text-sm font-bold text-clay">
          <span
            aria-hidden
            className="mt-[0.1em] grid size-[1.2em] shrink-0 place-items-center rounded-full bg-clay text-[0.85em] text-sheet"
          >
            !
          </span>
          <span className="min-w-0">{error}</span>
        </p>
      ) : null}
    </div>
  );
}
