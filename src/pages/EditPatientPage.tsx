import { useNavigate, useParams } from 'react-router-dom';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { keptState } from '#src/app/UnsavedGuard.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { BackLink } from '#src/features/clinic/BackLink.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { ChangePatientForm } from '#src/features/patients/ChangePatientForm.tsx';
import { OpenedRecord } from '#src/features/patients/OpenedRecord.tsx';
import { recordPlace } from '#src/features/patients/patient-places.ts';

export function EditPatientPage() {
  const { patientId = '' } = useParams();
  return (
    <PagePane narrow>
      <BackLink to={recordPlace(patientId)}>Record</BackLink>
      <OpenedRecord key={patientId} patientId={patientId}>
        {(record) => <Edit record={record} />}
      </OpenedRecord>
    </PagePane>
  );
}

function Edit({ record }: { record: PatientRecord }) {
  const heading = usePageHeading('Change a record');
  const navigate = useNavigate();
  const kept = keptState('The record is kept as you changed it.');
  return (
    <>
      <PageHeader
        title={<span className="wrap-anywhere">Change the record of {record.name}</span>}
        headingRef={heading}
      />
      <ChangePatientForm
        record={record}
        onChanged={() => void navigate(recordPlace(record.id), { replace: true, state: kept })}
      />
    </>
  );
}
