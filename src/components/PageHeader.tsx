import type { ReactNode, Ref } from 'react';

type Props = {
  title: ReactNode;
  /** One line under the title. */
  detail?: ReactNode;
  actions?: ReactNode;
  /** For a router that moves the focus to the heading of a new page. */
  headingRef?: Ref<HTMLHeadingElement>;
};

/** The first heading of a page, what it is about, and what can be done with the whole of it. */
export function PageHeader({ title, detail, actions, headingRef }: Props) {
  return (
    <header className="flex flex-wrap items-start justify-between gap-x-6 gap-y-3">
      <div className="min-w-0 grow basis-60">
        <h1 ref={headingRef} tabIndex={-1} className="text-2xl leading-tight">
          {title}
        </h1>
        {detail ? <div className="mt-1 text-ink-soft">{detail}</div> : null}
      </div>
      {actions ? <div className="flex flex-wrap gap-3">{actions}</div> : null}
    </header>
  );
}
