import { Users } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import type { FlagRow } from '#shared/triage/contract.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { TwoPanes } from '#src/features/clinic/TwoPanes.tsx';
import { useArrivals } from '#src/features/triage/arrivals.ts';
import { CasePane } from '#src/features/triage/CasePane.tsx';
import { useMorningRound } from '#src/features/triage/queries.ts';
import { stepInQueue } from '#src/features/triage/queue.ts';
import { Queue } from '#src/features/triage/Queue.tsx';
import { QueueFoot } from '#src/features/triage/QueueFoot.tsx';
import { QueueHead } from '#src/features/triage/QueueHead.tsx';
import { rowLinkId } from '#src/features/triage/QueueRow.tsx';
import { refusalOf } from '#src/features/triage/refusals.ts';
import { ShortcutList } from '#src/features/triage/ShortcutList.tsx';
import { useShortcuts } from '#src/features/triage/shortcuts.ts';
import { useNowMs } from '#src/lib/now.ts';

/** The queue on the left, the case on the right; on a narrow screen one or the other. */
export function MorningRoundPage() {
  const flagId = useParams().flagId ?? null;
  const { personId, clinic } = useMe();
  const nowMs = useNowMs();
  const navigate = useNavigate();
  const round = useMorningRound();
  const flags = round.data?.flags;
  const arrivals = useArrivals(flags, flagId);
  const heading = usePageHeading('Morning round');
  const [keysShown, setKeysShown] = useState(false);

  // A flag that has just been closed is no longer in the queue, yet a step goes on from where it stood.
  const [lastOpen, setLastOpen] = useState<FlagRow | null>(null);
  const openRow = flags?.find((flag) => flag.id === flagId) ?? null;
  if (openRow && openRow !== lastOpen) setLastOpen(openRow);

  function step(by: 1 | -1) {
    const from = flagId !== null && lastOpen?.id === flagId ? lastOpen : null;
    const next = stepInQueue(flags ?? [], from, by);
    if (next) void navigate(`/round/${next.id}`, { replace: flagId !== null });
  }
  useShortcuts({ j: () => step(1), k: () => step(-1), '?': () => setKeysShown(true) });

  const cameFrom = useRef<string | null>(null);
  useEffect(() => {
    const left = cameFrom.current;
    cameFrom.current = flagId;
    if (left === null || flagId !== null) return;
    (document.getElementById(rowLinkId(left)) ?? heading.current)?.focus();
  }, [flagId, heading]);

  return (
    <>
      <TwoPanes
        openKey={flagId}
        listHead={
          <QueueHead
            round={round.data}
            headingRef={heading}
            latest={arrivals.latest}
            caseOpen={flagId !== null}
          />
        }
        list={
          round.data ? (
            <>
              <Queue
                flags={round.data.flags}
                quiet={round.data.quiet}
                selectedId={flagId}
                newIds={arrivals.unopened}
                meId={personId}
                timeZone={clinic.timeZone}
                nowMs={nowMs}
              />
              <QueueFoot onShowKeys={() => setKeysShown(true)} />
            </>
          ) : (
            <div className="px-5">
              {round.error ? (
                <ErrorState
                  title="The morning round could not be loaded."
                  retry={{
                    label: 'Try again',
                    onRetry: () => void round.refetch(),
                    busy: round.isFetching,
                  }}
                >
                  {refusalOf(round.error).title}
                </ErrorState>
              ) : (
                <LoadingState label="The morning round is loading" lines={8} />
              )}
            </div>
          )
        }
        detail={
          flagId === null ? (
            flags?.length === 0 ? null : (
              <EmptyState icon={Users} title="No case is open.">
                Choose one from the queue. Opening it tells the patient that you have read it.
              </EmptyState>
            )
          ) : (
            <CasePane key={flagId} flagId={flagId} nowMs={nowMs} />
          )
        }
      />
      <ShortcutList open={keysShown} onOpenChange={setKeysShown} />
    </>
  );
}
