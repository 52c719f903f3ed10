import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

export type SignShapeName = 'octagon' | 'triangle' | 'half-circle' | 'ring';

type Props = {
  shape: SignShapeName;
  /** As high as the text beside it, or large at the head of a screen. */
  size?: 'text' | 'large';
};

/** Four signs told apart by their outline, each with its own colour. They carry no words: those stand beside. */
export function SignShape({ shape, size = 'text' }: Props) {
  return (
    <svg
      aria-hidden
      viewBox="0 0 24 24"
      className={classNames('shrink-0 fill-none', size === 'text' ? 'size-[1.15em]' : 'size-16')}
    >
      {shapes[shape]}
    </svg>
  );
}

/** A stroke and a dot rather than a letter, so that no font decides its weight. */
function Exclamation({ top, foot, dot }: { top: number; foot: number; dot: number }) {
  return (
    <>
      <path
        d={`M12 ${top}V${foot}`}
        strokeLinecap="round"
        className="stroke-sheet stroke-[2.6] forced-colors:stroke-[Canvas]"
      />
      <circle cx="12" cy={dot} r="1.5" className="fill-sheet forced-colors:fill-[Canvas]" />
    </>
  );
}

const shapes: Record<SignShapeName, ReactNode> = {
  octagon: (
    <>
      <path
        d="M7.2 .5H16.800L23.5 7.200V16.800L16.8 23.500H7.200L.5 16.800V7.200Z"
        className="fill-clay forced-colors:fill-[CanvasText]"
      />
      <Exclamation top={6} foot={12.6} dot={17.4} />
    </>
  ),
  triangle: (
    <>
      <path
        d="M12 2.300L22.8 21.300H1.200Z"
        strokeLinejoin="round"
        className="fill-ochre stroke-ochre stroke-2 forced-colors:fill-[CanvasText] forced-colors:stroke-[CanvasText]"
      />
      <Exclamation top={9.4} foot={14} dot={18.2} />
    </>
  ),
  'half-circle': (
    <>
      <circle
        cx="12"
        cy="12"
        r="9.8"
        className="stroke-slate stroke-[2.6] forced-colors:stroke-[CanvasText]"
      />
      <path d="M12 2.200A9.8 9.8 0 0 1 12 21.800Z" className="fill-slate forced-colors:fill-[CanvasText]" />
    </>
  ),
  ring: (
    <circle cx="12" cy="12" r="9.5" className="stroke-moss stroke-[3] forced-colors:stroke-[CanvasText]" />
  ),
};
