import { VisuallyHidden } from './VisuallyHidden.tsx';

type Props = {
  count: number;
  /** What the number counts, in words that hold the number: "6 to see". */
  label: string;
};

/** A small count; nothing at all when there is nothing to count. */
export function Badge({ count, label }: Props) {
  if (count <= 0) return null;
  return (
    <span className="inline-grid h-[1.5em] min-w-[1.5em] place-items-center rounded-full bg-wire px-[0.45em] text-[0.8125rem] leading-none font-black text-ink">
      <span aria-hidden>{count > 99 ? '99+' : count}</span>
      <VisuallyHidden>{label}</VisuallyHidden>
    </span>
  );
}
