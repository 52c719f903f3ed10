import { MailCheck } from 'lucide-react';
import { useState } from 'react';
import type { Delivery } from '#shared/notifications/contract.ts';
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
import { DeliveryList } from '#src/features/deliveries/DeliveryList.tsx';
import { useDeliveries } from '#src/features/deliveries/queries.ts';
import { useNowMs } from '#src/lib/now.ts';
import { refusalOf } from '#src/lib/refusal.ts';

/** What should have reached somebody and did not, and what goes out otherwise. */
export function DeliveriesPage() {
  const { roles } = useMe();
  const heading = usePageHeading('Deliveries');
  const { data, error, isFetching, refetch } = useDeliveries();
  const [kept, setKept] = useState<string | null>(null);
  return (
    <PagePane>
      <PageHeader
        title="Deliveries"
        detail="Mail, push, SMS and calls to patients and staff. None of them says anything about health."
        headingRef={heading}
      />
      <ClinicTabs roles={roles} />
      <KeptNotice text={kept} />
      {data ? (
        <>
          {data.failed.length + data.late.length === 0 ? (
            <EmptyState icon={MailCheck} title="Everything got through.">
              What fails or comes back stands here until it is sent again.
            </EmptyState>
          ) : null}
          <Group title="Failed or came back" deliveries={data.failed} onSent={setKept} />
          <Group title="Waiting for over ten minutes" deliveries={data.late} onSent={setKept} />
          <Group title="Newest" deliveries={newestBesides(data)} onSent={setKept} />
        </>
      ) : error ? (
        <ErrorState
          title="The deliveries could not be loaded."
          retry={{ label: 'Try again', onRetry: () => void refetch(), busy: isFetching }}
        >
          {refusalOf(error).title}
        </ErrorState>
      ) : (
        <LoadingState label="The deliveries are loading" lines={8} />
      )}
    </PagePane>
  );
}

type Lists = { failed: Delivery[]; late: Delivery[]; recent: Delivery[] };

/** Nothing stands on the page twice. */
function newestBesides({ failed, late, recent }: Lists): Delivery[] {
  const above = new Set([...failed, ...late].map(({ id }) => id));
  return recent.filter(({ id }) => !above.has(id));
}

type GroupProps = { title: string; deliveries: Delivery[]; onSent: (words: string) => void };

function Group({ title, deliveries, onSent }: GroupProps) {
  const { timeZone } = useMe().clinic;
  const nowMs = useNowMs();
  if (deliveries.length === 0) return null;
  return (
    <section>
      <SectionHeading wire>{`${title} · ${deliveries.length}`}</SectionHeading>
      <DeliveryList deliveries={deliveries} nowMs={nowMs} timeZone={timeZone} onSent={onSent} />
    </section>
  );
}
