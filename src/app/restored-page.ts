/**
 * The browser may keep a page whole and show it again when somebody goes back, with all that was on it. Whoever
 * is there by then need not be the one who left it: it is hidden and loaded anew.
 */
export function reloadRestoredPages(): void {
  window.addEventListener('pageshow', ({ persisted }) => {
    if (!persisted) return;
    document.body.hidden = true;
    window.location.reload();
  });
}
