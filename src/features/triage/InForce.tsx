import type { FlagCase } from '#shared/triage/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { Tag } from '#src/components/Tag.tsx';
import { formatDate } from '#src/lib/format.ts';

/** The precautions that a clinician has not lifted, with the day on which each is usually looked at. */
export function InForce({ flag }: { flag: FlagCase }) {
  return (
    <section aria-labelledby="case-in-force">
      <SectionHeading id="case-in-force" level={3} wire>
        In force on day {flag.patient.day}
      </SectionHeading>
      {flag.inForce.length === 0 ? (
        <p className="text-ink-soft">No precaution is in force.</p>
      ) : (
        <ul className="grid gap-2 text-[0.9375rem] leading-snug">
          {flag.inForce.map((precaution) => (
            <li key={precaution.code}>
              {precaution.text.replace(/\.$/u, '')},{' '}
              <span className="inline-block text-ink-soft">
                usually to {formatDate(precaution.usualDate)}
              </span>{' '}
              {precaution.due ? <Tag tone="ochre">Sign-off due</Tag> : null}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
