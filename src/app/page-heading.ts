import { useEffect, useRef } from 'react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';

let onFirstPage = true;

/**
 * Names the document after the page, and moves the focus to the returned ref's heading when a person arrives
 * there from another page. The first page of a visit leaves the focus at the top, where the browser puts it.
 */
export function usePageHeading(title: string): RefObject<HTMLHeadingElement | null> {
  const { t } = useTranslation();
  const heading = useRef<HTMLHeadingElement>(null);
  const documentTitle = t('title', { page: title });
  useEffect(() => {
    document.title = documentTitle;
  }, [documentTitle]);
  useEffect(() => {
    if (onFirstPage) onFirstPage = false;
    else heading.current?.focus({ preventScroll: true });
  }, []);
  return heading;
}
