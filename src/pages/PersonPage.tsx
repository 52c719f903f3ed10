import { useState } from 'react';
import { useParams } from 'react-router-dom';
import type { StaffPerson } from '#shared/people/contract.ts';
import { useDocumentTitle, usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { BackLink } from '#src/features/clinic/BackLink.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { AccessSection } from '#src/features/people/AccessSection.tsx';
import { ActList } from '#src/features/people/ActList.tsx';
import { peoplePlace } from '#src/features/people/people-places.ts';
import { PersonDetailsForm } from '#src/features/people/PersonDetailsForm.tsx';
import { useStaff } from '#src/features/people/queries.ts';
import { RolesSection } from '#src/features/people/RolesSection.tsx';
import { StaffInvitation } from '#src/features/people/StaffInvitation.tsx';
import { nameAndTitle, staffStateWords } from '#src/features/people/words.ts';
import { useNowMs } from '#src/lib/now.ts';
import { refusalOf } from '#src/lib/refusal.ts';

/** One person of the clinic: details, roles, the way in and the way out. */
export function PersonPage() {
  const { personId } = useParams();
  useDocumentTitle('Person');
  const staff = useStaff();
  const person = staff.data?.find(({ id }) => id === personId);
  return (
    <PagePane>
      <BackLink to={peoplePlace}>People</BackLink>
      {person && staff.data ? (
        <Person key={person.id} person={person} people={staff.data} />
      ) : staff.data ? (
        <ErrorState title="There is no such person at the clinic." />
      ) : staff.error ? (
        <ErrorState
          title="The person could not be loaded."
          retry={{ label: 'Try again', onRetry: () => void staff.refetch(), busy: staff.isFetching }}
        >
          {refusalOf(staff.error).title}
        </ErrorState>
      ) : (
        <LoadingState label="The person is loading" lines={8} />
      )}
    </PagePane>
  );
}

function Person({ person, people }: { person: StaffPerson; people: StaffPerson[] }) {
  const { personId: meId, clinic } = useMe();
  const nowMs = useNowMs();
  const heading = usePageHeading('Person');
  const [kept, setKept] = useState<string | null>(null);
  const { timeZone } = clinic;
  return (
    <>
      <PageHeader
        title={<span className="wrap-anywhere">{nameAndTitle(person)}</span>}
        detail={staffStateWords(person, nowMs, timeZone)}
        headingRef={heading}
      />
      <KeptNotice text={kept} />
      {person.waiting.length > 0 ? (
        <section>
          <SectionHeading wire>Waits for a second person</SectionHeading>
          <ActList acts={person.waiting} meId={meId} nowMs={nowMs} timeZone={timeZone} onKept={setKept} />
        </section>
      ) : null}
      <div className="grid gap-x-12 gap-y-8 @4xl/clinic:grid-cols-2">
        <div className="grid content-start gap-8">
          <RolesSection person={person} people={people} meId={meId} onKept={setKept} />
          <AccessSection person={person} people={people} meId={meId} onKept={setKept} />
        </div>
        <div className="grid content-start gap-8">
          {person.firstSignedInAt === null ? (
            <StaffInvitation person={person} nowMs={nowMs} timeZone={timeZone} onKept={setKept} />
          ) : null}
          <PersonDetailsForm person={person} onKept={setKept} />
        </div>
      </div>
    </>
  );
}
