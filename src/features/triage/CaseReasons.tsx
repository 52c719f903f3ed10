import type { FlagCase } from '#shared/triage/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { CalledMistake } from './CalledMistake.tsx';
import { UrgencySign } from './UrgencySign.tsx';

type Props = { flag: FlagCase; timeZone: string; nowMs: number };

/** Every finding in words; the rule, its version and where it comes from are folded away below each. */
export function CaseReasons({ flag, timeZone, nowMs }: Props) {
  return (
    <section aria-labelledby="case-why">
      <SectionHeading id="case-why" level={3} wire>
        Why this was flagged
      </SectionHeading>
      <CalledMistake flag={flag} timeZone={timeZone} nowMs={nowMs} />
      <ul>
        {flag.reasons.map((reason) => (
          <li
            key={`${reason.code} ${reason.title}`}
            className="border-b border-wire py-3 first:pt-1 last:border-b-0"
          >
            <h4 className="flex flex-wrap items-center gap-x-3 font-bold">
              {reason.title}
              <span className="text-sm">
                <UrgencySign urgency={reason.urgency} />
              </span>
            </h4>
            <p className="mt-0.5 text-ink-soft">{reason.sentence}</p>
            <details className="text-sm">
              <summary className="w-fit cursor-pointer py-1 text-leaf underline underline-offset-3 hover:text-leaf-deep">
                Rule and source
              </summary>
              <p className="text-ink-soft">
                Rule {reason.code}, version {reason.ruleVersion}. Source: {reason.source}
              </p>
            </details>
          </li>
        ))}
      </ul>
    </section>
  );
}
