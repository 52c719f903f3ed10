import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

type Props = {
  large?: boolean;
  /** The native box, with the classes `peer sr-only`: it keeps keyboard, name and state. */
  children: ReactNode;
};

/** The drawn box of a native checkbox: it stands beside it and follows its state. */
export function CheckMark({ large = false, children }: Props) {
  return (
    <span className="relative inline-grid shrink-0 place-items-center">
      {children}
      <span
        aria-hidden
        className={classNames(
          'rounded-sm border-2 border-wire-strong bg-sheet peer-checked:border-leaf peer-checked:bg-leaf',
          'peer-focus-visible:outline-3 peer-focus-visible:outline-offset-2 peer-focus-visible:outline-focus',
          'peer-disabled:border-wire peer-disabled:bg-wire',
          large ? 'size-7' : 'size-6',
        )}
      />
      <svg
        aria-hidden
        viewBox="0 0 24 24"
        className="pointer-events-none invisible absolute size-[75%] fill-none stroke-sheet stroke-3 peer-checked:visible forced-colors:stroke-[CanvasText]"
        strokeLinecap="round"
        strokeLinejoin="round"
      >
        <path d="M5 12.5l4.5 4.5L19 7.5" />
      </svg>
    </span>
  );
}
