import { useBeforeUnload, useBlocker } from 'react-router-dom';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';

/** What a page that has just saved hands to the next one: it says so there, and nothing asks on the way. */
export const keptState = (kept: string) => ({ kept });

/** What the page before has just saved, if it has. */
export function keptIn(state: unknown): string | null {
  return typeof state === 'object' && state !== null && 'kept' in state && typeof state.kept === 'string'
    ? state.kept
    : null;
}

/** Asks before what was typed is lost: on the way to another page, and when the tab is closed or loaded anew. */
export function UnsavedGuard({ when }: { when: boolean }) {
  useBusyWhile(when);
  useBeforeUnload((event) => {
    if (when) event.preventDefault();
  });
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) =>
      when && currentLocation.pathname !== nextLocation.pathname && keptIn(nextLocation.state) === null,
  );
  return (
    <AlertDialog
      open={blocker.state === 'blocked'}
      onOpenChange={(open) => {
        if (!open) blocker.reset?.();
      }}
      title="Leave without saving?"
      description={<p>What you typed here is not saved, and it is gone when you leave.</p>}
      cancelLabel="Stay here"
      confirm={{ label: 'Leave', onConfirm: () => blocker.proceed?.(), danger: true }}
    />
  );
}
