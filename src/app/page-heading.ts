import { useEffect, useRef } from 'react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';

let onFirstPage = true;

/** Names the document. Never after a question or an answer: other programs can read the title. */
export function useDocumentTitle(page: string): void {
  const { t } = useTranslation();
  const title = t('title', { page });
  useEffect(() => {
    document.title = title;
  }, [title]);
}

/**
 * Names the document after the page, and moves the focus to the returned ref's heading when a person arrives
 * there from another page. The first page of a visit leaves the focus at the top, where the browser puts it.
 */
export function usePageHeading(title: string): RefObject<HTMLHeadingElement | null> {
  const heading = useRef<HTMLHeadingElement>(null);
  useDocumentTitle(title);
  useEffect(() => {
    if (onFirstPage) onFirstPage = false;
    else heading.current?.focus({ preventScroll: true });
  }, []);
  return heading;
}
