import type { ReactNode } from 'react';
import { usePageHeading } from '#src/app/page-heading.ts';
import { PageHeader } from '#src/components/PageHeader.tsx';

type Props = {
  title: string;
  /** What the document is called where the heading names a person: other programs can read the title. */
  documentTitle?: string;
  detail?: ReactNode;
  children?: ReactNode;
};

/** One step of a way in. The focus goes to its heading when it takes the place of another one. */
export function EntryStep({ title, documentTitle, detail, children }: Props) {
  const heading = usePageHeading(documentTitle ?? title);
  return (
    <div className="grid min-w-0 gap-5">
      <PageHeader title={title} detail={detail} headingRef={heading} />
      {children}
    </div>
  );
}
