import { classNames } from './class-names.ts';

type Props = {
  /** Name of the group: the question that a number answers. */
  label: string;
  min?: number;
  max?: number;
  value: number | null;
  onPick: (value: number) => void;
  /**
   * The side of the hand that presses: an unfilled last row leaves its gap on the other side. The numbers keep
   * their order, because a scale that runs backwards is another instrument.
   */
  towards?: 'left' | 'right';
  /** Said after the lowest and the highest number, for those who hear them without the words around. */
  anchors?: { lowest: string; highest: string };
};

/** Whole numbers as large targets, four in a row where there is room for four. */
export function NumberGrid({ label, min = 0, max = 10, value, onPick, towards = 'left', anchors }: Props) {
  const numbers = Array.from({ length: max - min + 1 }, (_, index) => min + index);
  function nameOf(number: number) {
    if (anchors && number === min) return `${number}, ${anchors.lowest}`;
    if (anchors && number === max) return `${number}, ${anchors.highest}`;
    return undefined;
  }
  return (
    <div
      role="group"
      aria-label={label}
      className={classNames('flex flex-wrap gap-2.5', towards === 'right' && 'justify-end')}
    >
      {numbers.map((number) => (
        <button
          key={number}
          type="button"
          aria-pressed={number === value}
          aria-label={nameOf(number)}
          onClick={() => onPick(number)}
          className={classNames(
            'min-h-[max(4.375rem,70px)] shrink-0 basis-[max(3rem,calc(25%-0.46875rem))] rounded border text-2xl font-black tabular-nums',
            number === value ? 'picked' : 'border-wire-strong bg-sheet hover:bg-leaf-wash',
          )}
        >
          {number}
        </button>
      ))}
    </div>
  );
}
