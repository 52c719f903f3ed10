import { classNames } from '#src/components/class-names.ts';
import { SignShape } from '#src/components/SignShape.tsx';
import type { SignShapeName } from '#src/components/SignShape.tsx';
import type { Urgency } from '#shared/red-flags/findings.ts';
import { urgencyWords } from './words.ts';

const looks: Record<Urgency, { shape: SignShapeName; colour: string }> = {
  emergency: { shape: 'octagon', colour: 'text-clay' },
  urgent: { shape: 'triangle', colour: 'text-ochre' },
  'same-day': { shape: 'half-circle', colour: 'text-slate' },
  routine: { shape: 'ring', colour: 'text-moss' },
};

type Props = {
  urgency: Urgency;
  /** The word is always there; `hidden` leaves it to those who hear the screen, where it stands nearby. */
  word?: 'shown' | 'hidden';
  /** Bold and in the colour of the sign, as at the head of a group. */
  strong?: boolean;
};

export function UrgencySign({ urgency, word = 'shown', strong = false }: Props) {
  const { shape, colour } = looks[urgency];
  return (
    <span className={classNames('inline-flex items-center gap-2', strong && `font-black ${colour}`)}>
      <SignShape shape={shape} />
      <span className={word === 'hidden' ? 'sr-only' : undefined}>{urgencyWords[urgency]}</span>
    </span>
  );
}
