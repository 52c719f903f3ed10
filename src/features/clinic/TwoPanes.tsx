import type { ReactNode } from 'react';
import { classNames } from '#src/components/class-names.ts';

type Props = {
  /** What is open on the right; null for nothing. Each one starts at the top of its pane. */
  openKey: string | null;
  /** Stays on a narrow screen too; it decides itself what of it is shown there. */
  listHead: ReactNode;
  list: ReactNode;
  detail: ReactNode;
};

/**
 * A list and what is chosen of it. Where the shell has room (`clinic` container of 56 rem) they stand side by
 * side and scroll apart; elsewhere, also with very large text, one takes the place of the other.
 */
export function TwoPanes({ openKey, listHead, list, detail }: Props) {
  const isOpen = openKey !== null;
  return (
    <div className="@4xl/clinic:grid @4xl/clinic:h-full @4xl/clinic:grid-cols-[minmax(0,25rem)_minmax(0,1fr)]">
      <div
        className={classNames(
          'bg-paper @4xl/clinic:min-h-0 @4xl/clinic:overflow-y-auto @4xl/clinic:border-r @4xl/clinic:border-wire',
          !isOpen && '@max-4xl/clinic:pb-6',
        )}
      >
        {listHead}
        <div className={isOpen ? '@max-4xl/clinic:hidden' : undefined}>{list}</div>
      </div>
      <div
        key={openKey}
        className={classNames(
          'min-w-0 bg-sheet px-5 py-4 @4xl/clinic:min-h-0 @4xl/clinic:overflow-y-auto @4xl/clinic:px-7 @4xl/clinic:py-5',
          !isOpen && '@max-4xl/clinic:hidden',
        )}
      >
        {detail}
      </div>
    </div>
  );
}
