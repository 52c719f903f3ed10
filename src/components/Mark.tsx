import { MarkFigure } from './MarkFigure.tsx';

/** The mark with the name beside it, in lower case. The height follows the size of the text around. */
export function Mark() {
  return (
    <span className="inline-flex items-center gap-2.5 text-xl font-black tracking-tight text-ink">
      <MarkFigure />
      espalier
    </span>
  );
}
