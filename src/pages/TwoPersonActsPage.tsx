import { UserCheck } from 'lucide-react';
import { useState } from 'react';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { ClinicTabs } from '#src/features/clinic/ClinicTabs.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { ActList } from '#src/features/people/ActList.tsx';
import { useTwoPersonActs } from '#src/features/people/queries.ts';
import { useNowMs } from '#src/lib/now.ts';
import { refusalOf } from '#src/lib/refusal.ts';

/** What one person may not do alone: what waits, and what was decided lately. */
export function TwoPersonActsPage() {
  const { personId: meId, roles, clinic } = useMe();
  const heading = usePageHeading('Confirmations');
  const nowMs = useNowMs();
  const acts = useTwoPersonActs(true);
  const [kept, setKept] = useState<string | null>(null);
  const waiting = acts.data?.filter(({ state }) => state === 'waiting') ?? [];
  const decided = acts.data?.filter(({ state }) => state !== 'waiting') ?? [];
  const shared = { meId, nowMs, timeZone: clinic.timeZone, onKept: setKept };
  return (
    <PagePane>
      <PageHeader
        title="Confirmations"
        detail="What gives power over others takes two people: one asks, another confirms."
        headingRef={heading}
      />
      <ClinicTabs roles={roles} />
      <KeptNotice text={kept} />
      {acts.data ? (
        <>
          <section>
            <SectionHeading wire>Waiting</SectionHeading>
            {waiting.length > 0 ? (
              <ActList acts={waiting} {...shared} />
            ) : (
              <EmptyState icon={UserCheck} title="Nothing waits for a second person." />
            )}
          </section>
          {decided.length > 0 ? (
            <section>
              <SectionHeading wire>Decided in the last 90 days</SectionHeading>
              <ActList acts={decided} {...shared} />
            </section>
          ) : null}
        </>
      ) : acts.error ? (
        <ErrorState
          title="The confirmations could not be loaded."
          retry={{ label: 'Try again', onRetry: () => void acts.refetch(), busy: acts.isFetching }}
        >
          {refusalOf(acts.error).title}
        </ErrorState>
      ) : (
        <LoadingState label="The confirmations are loading" />
      )}
    </PagePane>
  );
}
