/** The divider: a thin line with a knot at each end. */
export function Wire() {
  return (
    <div aria-hidden className="flex h-1.5 items-center">
      <span className="size-1.5 shrink-0 rounded-full bg-wire-strong" />
      <span className="h-px grow bg-wire forced-colors:bg-[CanvasText]" />
      <span className="size-1.5 shrink-0 rounded-full bg-wire-strong" />
    </div>
  );
}
