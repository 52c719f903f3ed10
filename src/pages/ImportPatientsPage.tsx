import { useNavigate } from 'react-router-dom';
import { usePageHeading } from '#src/app/page-heading.ts';
import { keptState } from '#src/app/UnsavedGuard.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { BackLink } from '#src/features/clinic/BackLink.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { ImportForm } from '#src/features/patients/ImportForm.tsx';

function enrolledWords(enrolled: number, alreadyEnrolled: number): string {
  const words = enrolled === 1 ? '1 patient is enrolled.' : `${enrolled} patients are enrolled.`;
  return alreadyEnrolled === 0 ? words : `${words} ${alreadyEnrolled} had been enrolled already.`;
}

export function ImportPatientsPage() {
  const heading = usePageHeading('Enrol from a list');
  const navigate = useNavigate();
  return (
    <PagePane>
      <BackLink to="/caseload">Caseload</BackLink>
      <PageHeader
        title="Enrol from a list"
        detail="Nothing is kept until you enrol, and then all of the list or none of it."
        headingRef={heading}
      />
      <ImportForm
        onEnrolled={(enrolled, alreadyEnrolled) =>
          void navigate('/caseload', {
            replace: true,
            state: keptState(enrolledWords(enrolled, alreadyEnrolled)),
          })
        }
      />
    </PagePane>
  );
}
