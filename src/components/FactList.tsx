import type { ReactNode } from 'react';

type Fact = {
  /** Where two facts have the same name. */
  key?: string;
  label: string;
  value: ReactNode;
};

/** Named facts, one a line; where it is narrow, the value stands under its name. */
export function FactList({ facts }: { facts: Fact[] }) {
  return (
    <dl className="@container">
      {facts.map(({ key, label, value }) => (
        <div
          key={key ?? label}
          className="border-b border-wire py-2 leading-snug last:border-b-0 @md:grid @md:grid-cols-[11rem_minmax(0,1fr)] @md:gap-4"
        >
          <dt className="text-sm text-ink-soft @md:pt-px">{label}</dt>
          <dd className="min-w-0">{value}</dd>
        </div>
      ))}
    </dl>
  );
}
