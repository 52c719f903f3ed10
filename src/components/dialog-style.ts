/** What lies over the page while a dialog is open. */
export const dialogVeilClass = 'fixed inset-0 z-40 bg-[rgb(0_0_0/0.5)]';

/** The floating sheet: in the middle where there is room, as wide as the screen where there is not. */
export const dialogPanelClass =
  'fixed top-1/2 left-1/2 z-50 max-h-[calc(100dvh-2rem)] w-[min(34rem,calc(100vw-1.5rem))] -translate-x-1/2 ' +
  '-translate-y-1/2 overflow-y-auto rounded border border-wire bg-paper p-5 shadow-2xl';
