import type { Reason } from '#shared/triage/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { UrgencySign } from './UrgencySign.tsx';

/** Every finding in words (the sentence names the rule and its version) and where its rule comes from. */
export function CaseReasons({ reasons }: { reasons: Reason[] }) {
  return (
    <section aria-labelledby="case-why">
      <SectionHeading id="case-why" level={3} wire>
        Why this was flagged
      </SectionHeading>
      <ul>
        {reasons.map((reason) => (
          <li key={reason.code} className="border-b border-wire py-3 first:pt-1 last:border-b-0">
            <h4 className="flex flex-wrap items-center gap-x-3 font-bold">
              {reason.title}
              <span className="text-sm">
                <UrgencySign urgency={reason.urgency} />
              </span>
            </h4>
            <p className="mt-0.5 text-ink-soft">{reason.sentence}</p>
            <p className="mt-1 text-sm text-ink-soft">Source: {reason.source}</p>
          </li>
        ))}
      </ul>
    </section>
  );
}
