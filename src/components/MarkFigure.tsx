/** A trunk, three wires, branches. `public/favicon.svg` holds the same drawing. */
export function MarkFigure() {
  return (
    <svg aria-hidden viewBox="0 0 40 40" className="size-[1.5em] shrink-0 fill-none" strokeLinecap="round">
      <path d="M1 10H39M1 20.5H39M1 31H39" className="stroke-wire-strong stroke-[1.4]" />
      <path
        d="M20 39V9M20 15Q20 10 14 10H7M20 26Q20 20.5 26 20.5H35M20 36Q20 31 14 31H5"
        className="stroke-bark stroke-3"
      />
      <g className="fill-leaf">
        <ellipse cx="20" cy="4.5" rx="2.4" ry="4.2" />
        <ellipse cx="6.5" cy="7" rx="4" ry="2.6" transform="rotate(-24 6.5 7)" />
        <ellipse cx="34" cy="17.5" rx="4" ry="2.6" transform="rotate(24 34 17.5)" />
        <ellipse cx="5" cy="28" rx="4" ry="2.6" transform="rotate(-24 5 28)" />
      </g>
    </svg>
  );
}
