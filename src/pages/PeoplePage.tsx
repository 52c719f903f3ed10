import { UserPlus, Users } from 'lucide-react';
import { lazy, Suspense, useState } from 'react';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { Button } from '#src/components/Button.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { ClinicTabs } from '#src/features/clinic/ClinicTabs.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { useStaff } from '#src/features/people/queries.ts';
import { StaffTable } from '#src/features/people/StaffTable.tsx';
import { useNowMs } from '#src/lib/now.ts';
import { refusalOf } from '#src/lib/refusal.ts';

const InviteStaffForm = lazy(async () => ({
  default: (await import('#src/features/people/InviteStaffForm.tsx')).InviteStaffForm,
}));

/** Everybody who works for the clinic. */
export function PeoplePage() {
  const { roles, clinic } = useMe();
  const heading = usePageHeading('People');
  const nowMs = useNowMs();
  const staff = useStaff();
  const [inviting, setInviting] = useState(false);
  const [kept, setKept] = useState<string | null>(null);
  return (
    <PagePane>
      <PageHeader
        title="People"
        detail="Who works for the clinic, and what they may do."
        headingRef={heading}
        actions={
          <Button icon={UserPlus} onClick={() => setInviting(true)}>
            Invite somebody
          </Button>
        }
      />
      <ClinicTabs roles={roles} />
      <KeptNotice text={kept} />
      {staff.data === undefined ? (
        staff.error ? (
          <ErrorState
            title="The people could not be loaded."
            retry={{ label: 'Try again', onRetry: () => void staff.refetch(), busy: staff.isFetching }}
          >
            {refusalOf(staff.error).title}
          </ErrorState>
        ) : (
          <LoadingState label="The people are loading" lines={8} />
        )
      ) : staff.data.length === 0 ? (
        <EmptyState icon={Users} title="Nobody yet.">
          Invite the first one.
        </EmptyState>
      ) : (
        <StaffTable people={staff.data} nowMs={nowMs} timeZone={clinic.timeZone} />
      )}
      {inviting ? (
        <Suspense>
          <InviteStaffForm
            onClose={() => setInviting(false)}
            onInvited={(person) => {
              setInviting(false);
              setKept(
                person.waiting.length > 0
                  ? `${person.name} is invited. A guarded role waits for a second person.`
                  : `${person.name} is invited.`,
              );
            }}
          />
        </Suspense>
      ) : null}
    </PagePane>
  );
}
