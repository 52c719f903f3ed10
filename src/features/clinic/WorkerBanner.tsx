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
  if (unevaluated === 1) return '1 check-in waits for the rules.';
  if (unevaluated > 1) return `${unevaluated} check-ins wait for the rules.`;
  if (lastBeatAt === null) return 'The program that looks at them has not started.';
  return `The program that looks at them was last heard of at ${formatTime(lastBeatAt, timeZone)}.`;
}

/**
 * Stands over every clinic screen while check-ins may be shown late, while notifications do not get through, or while this
 * screen cannot know. A flag that is missing looks like a patient who is well, so silence would be the worst
 * answer.
 */
export function WorkerBanner({ clinic }: Props) {
  const { data, error } = useWorkerHealth();
  const isLate = data !== undefined && (data.late || data.unevaluated > 0);
  return (
    // The live region stands empty until then, or what arrives in it is not announced.
    <div
      role="alert"
      className="z-20 max-lg:[@media(min-height:34em)]:sticky max-lg:[@media(min-height:34em)]:top-0 print:hidden"
    >
      {error ? (
        <Banner tone="danger" title="The server cannot be reached. What you see may be old.">
          Check the connection; this screen tries again by itself. <CallLine clinic={clinic} />
        </Banner>
      ) : null}
      {!error && isLate ? (
        <Banner tone="danger" title="Check-ins may be shown late.">
          {waitingWords(data.unevaluated, data.lastBeatAt, clinic.timeZone)} An empty queue does not mean that
          all is well. Tell whoever looks after Espalier. <CallLine clinic={clinic} />
        </Banner>
      ) : null}
      {!error && data !== undefined && data.unsent > 0 ? (
        <Banner
          tone="danger"
          title={
            data.unsent === 1
              ? '1 notification did not get through.'
              : `${data.unsent} notifications did not get through.`
          }
        >
          Look at the round itself, not only at your phone and mail.
        </Banner>
      ) : null}
    </div>
  );
}
