import { useNavigate } from 'react-router-dom';
import { usePageHeading } from '#src/app/page-heading.ts';
import { keptState } from '#src/app/UnsavedGuard.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { BackLink } from '#src/features/clinic/BackLink.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { EnrolPatientForm } from '#src/features/patients/EnrolPatientForm.tsx';
import { letterPlace, recordPlace } from '#src/features/patients/patient-places.ts';

const invitedWords = {
  email: 'The record is kept, and the invitation is on its way.',
  letter: 'The record is kept.',
  'not-yet': 'The record is kept. The patient is not invited yet.',
};

export function EnrolPatientPage() {
  const heading = usePageHeading('Enrol a patient');
  const navigate = useNavigate();
  return (
    <PagePane narrow>
      <BackLink to="/caseload">Caseload</BackLink>
      <PageHeader title="Enrol a patient" headingRef={heading} />
      <EnrolPatientForm
        onEnrolled={({ id, invitation }, invite) => {
          const place = invite === 'letter' && invitation ? letterPlace(invitation.id) : recordPlace(id);
          void navigate(place, { replace: true, state: keptState(invitedWords[invite]) });
        }}
      />
    </PagePane>
  );
}
