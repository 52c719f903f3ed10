import type { ClinicCard } from '#shared/clinic/contract.ts';
import { Banner } from '#src/components/Banner.tsx';
import { formatTime, telephoneHref } from '#src/lib/format.ts';
import { useWorkerHealth } from './queries.ts';

type Props = { clinic: ClinicCard };

function CallLine({ clinic: { onCallNumber } }: Props) {
  return (
    <>
      The phone lines stay open: on call{' '}
      <a
        href={telephoneHref(onCallNumber)}
        className="font-bold whitespace-nowrap underline underline-offset-3"
      >
        {onCallNumber}
      </a>
      .
    </>
  );
}

/** "1 check-in is waiting", or what is known when none is. */
function waitingWords(unevaluated: number, lastBeatAt: string | null, timeZone: string): string {
  if (unevaluated === 1) return '1 check-in has not been looked at by the rules yet.';
  if (unevaluated > 1) return `${unevaluated} check-ins have not been looked at by the rules yet.`;
  if (lastBeatAt === null) return 'The program that looks at them has not started.';
  return `The program that looks at them was last heard of at ${formatTime(lastBeatAt, timeZone)}.`;
}

/**
 * Stands over every clinic screen while check-ins may be shown late, or while this screen cannot know. A flag
 * that is missing looks like a patient who is well, so silence would be the worst answer.
 */
export function WorkerBanner({ clinic }: Props) {
  const { data, error } = useWorkerHealth();
  const isLate = data !== undefined && (data.late || data.unevaluated > 0);
  return (
    // The live region stands empty until then, or what arrives in it is not announced.
    <div role="alert" className="max-lg:sticky max-lg:top-0 max-lg:z-20 print:hidden">
      {error ? (
        <Banner tone="danger" title="The server cannot be reached. What you see may be old.">
          Check the connection; this screen tries again by itself. <CallLine clinic={clinic} />
        </Banner>
      ) : isLate ? (
        <Banner
          tone="danger"
          title="Check-ins may be shown late. An empty queue does not mean that all is well."
        >
          {waitingWords(data.unevaluated, data.lastBeatAt, clinic.timeZone)} Tell whoever looks after
          Espalier, and telephone the people you are worried about. <CallLine clinic={clinic} />
        </Banner>
      ) : null}
    </div>
  );
}
