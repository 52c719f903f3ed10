import { lazy, Suspense, useEffect, useRef, useState } from 'react';
import type { FlagCase } from '#shared/triage/contract.ts';
import { afterMove } from '#shared/triage/lifecycle.ts';
import { useKeeper } from '#src/app/caring.ts';
import { useMe } from '#src/app/session.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { useDraft } from '#src/lib/drafts.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { BesideUsual } from './BesideUsual.tsx';
import { CaseHead } from './CaseHead.tsx';
import { CaseHistory } from './CaseHistory.tsx';
import { CaseReasons } from './CaseReasons.tsx';
import { ClosedNotice } from './ClosedNotice.tsx';
import { InForce } from './InForce.tsx';
import { useClaimFlag, useFlagCase, useReleaseFlag } from './queries.ts';
import { RefusalBanner } from './RefusalBanner.tsx';
import { refusalOf } from './refusals.ts';
import { SafetyFacts } from './SafetyFacts.tsx';
import { useSeeOnce } from './see-once.ts';
import { useShortcuts } from './shortcuts.ts';
import { WhatNext } from './WhatNext.tsx';

/** The form brings the schemas and the form library with it, which nobody needs before they close a flag. */
const CloseFlagDialog = lazy(async () => ({
  default: (await import('./CloseFlagDialog.tsx')).CloseFlagDialog,
}));

type Props = { flagId: string; nowMs: number };

/** The case beside the queue. It is made anew for each flag (by `key`), so that nothing typed moves over. */
export function CasePane({ flagId, nowMs }: Props) {
  const { data, error, isFetching, refetch } = useFlagCase(flagId);
  if (data) return <Case flag={data} nowMs={nowMs} />;
  if (!error) return <LoadingState label="The case is loading" lines={8} />;
  if (error instanceof ApiProblem && error.code === 'not-found') {
    return (
      <ErrorState title="There is no such flag, or it is not yours to see.">
        <LinkButton to="/round" variant="outline">
          Back to the morning round
        </LinkButton>
      </ErrorState>
    );
  }
  return (
    <ErrorState
      title="The case could not be loaded."
      retry={{ label: 'Try again', onRetry: () => void refetch(), busy: isFetching }}
    >
      {refusalOf(error).title}
    </ErrorState>
  );
}

function Case({ flag, nowMs }: { flag: FlagCase; nowMs: number }) {
  const me = useMe();
  const { timeZone } = me.clinic;
  const [openForm, setOpenForm] = useState<'reply' | 'close' | null>(null);
  const claim = useClaimFlag(flag.id);
  const release = useReleaseFlag(flag.id);
  const reply = useDraft(useKeeper(), `flag/${flag.id}`);
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus({ preventScroll: true }), []);
  useSeeOnce(flag, flag.state !== 'closed');

  const isMine = flag.claimedBy?.personId === me.personId;
  const mayClaim = afterMove(flag.state, 'claim') !== null;
  const mayRelease = afterMove(flag.state, 'release') !== null && isMine;
  // A colleague's claim is not closed over their head.
  const mayClose = afterMove(flag.state, 'close') !== null && (isMine || flag.claimedBy === null);
  const move = (mutation: typeof claim) => {
    claim.reset();
    release.reset();
    mutation.mutate(undefined);
  };

  useShortcuts({
    c: () => mayClaim && !claim.isPending && move(claim),
    r: () => setOpenForm('reply'),
    x: () => mayClose && setOpenForm('close'),
  });

  const closedNotice = <ClosedNotice flag={flag} meName={me.name} timeZone={timeZone} nowMs={nowMs} />;
  return (
    <article className="@container/case" aria-label={`Case of ${flag.patient.name}`}>
      <CaseHead
        flag={flag}
        headingRef={heading}
        claim={{ possible: mayClaim, busy: claim.isPending, onClaim: () => move(claim) }}
        release={{ possible: mayRelease, busy: release.isPending, onRelease: () => move(release) }}
      />
      <div className="my-3 grid gap-3">
        <RefusalBanner error={claim.error ?? release.error} />
        {closedNotice}
      </div>
      <SafetyFacts person={flag.person} />
      <div className="mt-6 grid items-start gap-x-7 gap-y-7 @2xl/case:grid-cols-[minmax(0,1fr)_minmax(0,18rem)]">
        <div className="grid gap-7">
          <CaseReasons flag={flag} timeZone={timeZone} nowMs={nowMs} />
          <BesideUsual flag={flag} timeZone={timeZone} nowMs={nowMs} />
        </div>
        <div className="grid gap-7 @2xl/case:row-span-2">
          <WhatNext
            flag={flag}
            isMine={isMine}
            reply={reply}
            replyOpen={openForm === 'reply'}
            onReply={(open) => setOpenForm(open ? 'reply' : null)}
            onClose={mayClose ? () => setOpenForm('close') : null}
            timeZone={timeZone}
            nowMs={nowMs}
          />
          <InForce flag={flag} />
        </div>
        <CaseHistory flag={flag} timeZone={timeZone} nowMs={nowMs} />
      </div>
      {openForm === 'close' ? (
        <Suspense>
          <CloseFlagDialog
            flag={flag}
            onOpenChange={(open) => setOpenForm(open ? 'close' : null)}
            onClosed={() => {
              setOpenForm(null);
              // After the dialog has given the focus back to what is no longer there.
              setTimeout(() => heading.current?.focus(), 0);
            }}
            notice={closedNotice}
          />
        </Suspense>
      ) : null}
    </article>
  );
}
