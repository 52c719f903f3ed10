/** What scrolls an element: its nearest pane that has more than it shows, else the page. */
function scrollerOf(element: Element): Element {
  for (let pane = element.parentElement; pane; pane = pane.parentElement) {
    const { overflowY } = getComputedStyle(pane);
    const scrolls = overflowY === 'auto' || overflowY === 'scroll';
    if (scrolls && pane.scrollHeight > pane.clientHeight) return pane;
  }
  return document.scrollingElement ?? document.documentElement;
}

export function scrollToEnd(element: Element): void {
  const scroller = scrollerOf(element);
  scroller.scrollTop = scroller.scrollHeight;
}

/**
 * Remembers where an element stands on the screen; the returned function puts it there again after something
 * was added above it. The browser's own anchoring must be off for the element's surroundings.
 */
export function holdPlace(element: Element): () => void {
  const before = element.getBoundingClientRect().top;
  return () => {
    scrollerOf(element).scrollTop += element.getBoundingClientRect().top - before;
  };
}
