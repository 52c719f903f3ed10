import { Link } from 'react-router-dom';
import type { FlagCase } from '#shared/triage/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { eventDetail, eventSentence } from './words.ts';
import { UrgencySign } from './UrgencySign.tsx';

type Props = { flag: FlagCase; timeZone: string; nowMs: number };

const stateWords = { open: 'open', claimed: 'claimed', closed: 'closed' } as const;

/** What has been done with this flag, and the patient's other ones. */
export function CaseHistory({ flag, timeZone, nowMs }: Props) {
  return (
    <div className="grid gap-6">
      <section aria-labelledby="case-events">
        <SectionHeading id="case-events" level={3}>
          What happened
        </SectionHeading>
        <ol className="text-[0.9375rem] leading-snug">
          {flag.events.map((event) => (
            <li key={event.id} className="flex flex-wrap gap-x-3 py-1">
              <time dateTime={event.at} className="w-26 text-ink-soft">
                {formatMoment(event.at, nowMs, timeZone)}
              </time>
              <span className="min-w-0 grow basis-48">
                {[eventSentence(event), eventDetail(event)].filter(Boolean).join(': ')}
                {event.note ? (
                  <span className="block wrap-anywhere whitespace-pre-wrap text-ink-soft" dir="auto">
                    {event.note}
                  </span>
                ) : null}
              </span>
            </li>
          ))}
        </ol>
      </section>
      {flag.earlier.length === 0 ? null : (
        <section aria-labelledby="case-earlier">
          <SectionHeading id="case-earlier" level={3}>
            Other flags of this patient
          </SectionHeading>
          <ul className="text-[0.9375rem] leading-snug">
            {flag.earlier.map((earlier) => (
              <li key={earlier.id} className="border-b border-wire py-2 last:border-b-0">
                <Link
                  to={`/round/${earlier.id}`}
                  className="font-bold text-leaf underline underline-offset-3 hover:text-leaf-deep"
                >
                  {earlier.headline}
                </Link>
                <div className="mt-0.5 flex flex-wrap gap-x-3 text-sm text-ink-soft">
                  <UrgencySign urgency={earlier.urgency} />
                  <span>
                    {formatMoment(earlier.raisedAt, nowMs, timeZone)}&nbsp;· {stateWords[earlier.state]}
                  </span>
                </div>
              </li>
            ))}
          </ul>
        </section>
      )}
    </div>
  );
}
