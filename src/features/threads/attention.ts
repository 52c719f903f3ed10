import { useEffect, useState, useSyncExternalStore } from 'react';
import type { RefObject } from 'react';

const events = ['focus', 'blur', 'visibilitychange'] as const;

function subscribe(listener: () => void): () => void {
  // The events of the window do not pass the document, and the other way round.
  events.forEach((name) => window.addEventListener(name, listener, true));
  return () => events.forEach((name) => window.removeEventListener(name, listener, true));
}

/** Whether somebody can be before this page: it is visible and has the focus. */
export const useIsAttended = (): boolean =>
  useSyncExternalStore(subscribe, () => document.visibilityState === 'visible' && document.hasFocus());

/** Whether an element is inside what is scrolled into view. */
export function useIsInView(element: RefObject<Element | null>): boolean {
  const [inView, setInView] = useState(false);
  useEffect(() => {
    const watched = element.current;
    if (!watched) return undefined;
    const observer = new IntersectionObserver((entries) => {
      setInView(entries.at(-1)?.isIntersecting ?? false);
    });
    observer.observe(watched);
    return () => observer.disconnect();
  }, [element]);
  return inView;
}
