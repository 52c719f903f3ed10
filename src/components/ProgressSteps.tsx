import { classNames } from './class-names.ts';

type Props = {
  total: number;
  /** The step one stands on, from 1; it counts as filled. */
  current: number;
  /** The state in words: "Step 2 of 8". */
  label: string;
  /** What is left, shown beside the segments. */
  remaining?: string;
};

export function ProgressSteps({ total, current, label, remaining }: Props) {
  return (
    <div className="flex min-w-0 grow flex-wrap items-center gap-x-3 gap-y-1">
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={total}
        aria-valuenow={current}
        aria-valuetext={label}
        className="flex min-w-24 grow basis-24 gap-1.25"
      >
        {Array.from({ length: total }, (_, step) => (
          <span
            key={step}
            className={classNames(
              'h-1.5 grow rounded-full',
              step < current ? 'bg-leaf forced-colors:bg-[Highlight]' : 'bg-wire forced-colors:bg-[GrayText]',
            )}
          />
        ))}
      </div>
      {remaining ? <span className="text-sm text-ink-soft">{remaining}</span> : null}
    </div>
  );
}
