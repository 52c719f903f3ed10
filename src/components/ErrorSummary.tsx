import type { MouseEvent } from 'react';
import { OctagonAlert } from 'lucide-react';

export type SummaryItem = {
  /** The name of the control; the link puts the focus there. */
  name: string;
  message: string;
};

function goTo(event: MouseEvent, name: string) {
  event.preventDefault();
  document.getElementsByName(name)[0]?.focus();
}

/** Over a long form: everything that is not right, each line a link to its field. Empty, it says nothing. */
export function ErrorSummary({ title, items }: { title: string; items: SummaryItem[] }) {
  return (
    // The live region is there before its words, or they would not be announced.
    <div role="alert">
      {items.length === 0 ? null : (
        <div className="flex items-start gap-3 rounded bg-clay-wash px-4 py-3 leading-snug">
          <OctagonAlert className="mt-px size-[1.3em] shrink-0 text-clay" aria-hidden />
          <div className="min-w-0">
            <p className="font-bold">{title}</p>
            <ul className="mt-1 grid gap-1">
              {items.map(({ name, message }) => (
                <li key={`${name} ${message}`}>
                  <a
                    href={`#${name}`}
                    onClick={(event) => goTo(event, name)}
                    className="underline underline-offset-3"
                  >
                    {message}
                  </a>
                </li>
              ))}
            </ul>
          </div>
        </div>
      )}
    </div>
  );
}
