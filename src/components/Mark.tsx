import { MarkFigure } from './MarkFigure.tsx';

/**
 * The mark with the name beside it, in lower case. The height follows the size of the text around. In a container
 * too narrow for both the name is left to those who listen.
 */
export function Mark() {
  return (
    <span className="inline-flex items-center gap-2.5 text-xl font-black tracking-tight text-ink">
      <MarkFigure />
      <span className="@max-[9rem]:sr-only">espalier</span>
    </span>
  );
}
