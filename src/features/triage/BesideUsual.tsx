import type { FlagCase } from '#shared/triage/contract.ts';
import { DefinitionTable } from '#src/components/DefinitionTable.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { Sparkline } from '#src/components/Sparkline.tsx';
import { formatMoment, localDateOf } from '#src/lib/format.ts';
import { painTone } from './pain-tone.ts';
import { firstNameOf, seriesInWords } from './words.ts';

type Props = { flag: FlagCase; timeZone: string; nowMs: number };

const numberOf = (usual: string | null): number | null => {
  const value = Number.parseFloat(usual ?? '');
  return Number.isNaN(value) ? null : value;
};

function NotKnown() {
  return (
    <>
      <span aria-hidden className="text-ink-soft">
        –
      </span>
      <span className="sr-only">not known</span>
    </>
  );
}

/** What was answered beside the person's own usual, and what they wrote with it. */
export function BesideUsual({ flag, timeZone, nowMs }: Props) {
  const answered = formatMoment(flag.answeredAt, nowMs, timeZone);
  const isToday = localDateOf(flag.answeredAt, timeZone) === localDateOf(nowMs, timeZone);
  return (
    <section aria-labelledby="case-beside">
      <SectionHeading id="case-beside" level={3}>
        {isToday ? 'Today' : 'This check-in'} beside their usual
      </SectionHeading>
      {flag.beside.length === 0 ? (
        <p className="text-ink-soft">The check-in itself has not arrived yet, only what was ticked.</p>
      ) : (
        <DefinitionTable
          caption="Each answer, the person’s own usual, and the last 14 days"
          columns={[isToday ? `Today ${answered}` : answered, 'Usual', '14 days']}
          rows={flag.beside.map(({ label, today, usual, days14 }) => ({
            key: label,
            label,
            cells: [
              <strong key="today">{today}</strong>,
              usual ?? <NotKnown key="usual" />,
              days14 ? (
                <Sparkline
                  key="days"
                  values={days14}
                  reference={numberOf(usual) ?? undefined}
                  tone={painTone(days14, numberOf(usual))}
                  label={seriesInWords(label, days14, numberOf(usual))}
                />
              ) : null,
            ],
          }))}
        />
      )}
      {flag.note === null ? null : (
        <figure className="mt-4 border-l-3 border-wire pl-4">
          <figcaption className="text-sm font-bold">
            {firstNameOf(flag.answeredBy?.name ?? flag.patient.name)} wrote
          </figcaption>
          <blockquote dir="auto" className="whitespace-pre-wrap [unicode-bidi:isolate]">
            {flag.note}
          </blockquote>
        </figure>
      )}
    </section>
  );
}
