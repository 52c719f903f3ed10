import { useState } from 'react';
import { useLocation, useParams } from 'react-router-dom';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { keptIn } from '#src/app/UnsavedGuard.tsx';
import { BackLink } from '#src/features/clinic/BackLink.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { CaregiverSection } from '#src/features/patients/CaregiverSection.tsx';
import { InvitationSection } from '#src/features/patients/InvitationSection.tsx';
import { OpenedRecord } from '#src/features/patients/OpenedRecord.tsx';
import { IdentityFacts, OperationFacts, TeamFacts } from '#src/features/patients/RecordFacts.tsx';
import { RecordHead } from '#src/features/patients/RecordHead.tsx';
import { StateSection } from '#src/features/patients/StateSection.tsx';
import { SafetyFacts } from '#src/features/triage/SafetyFacts.tsx';
import { localDateOf } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';

/** One patient's record. */
export function PatientRecordPage() {
  const { patientId = '' } = useParams();
  return (
    <PagePane>
      <BackLink to="/caseload">Caseload</BackLink>
      {/* Another patient is another page, with nothing left over of the one before. */}
      <OpenedRecord key={patientId} patientId={patientId}>
        {(record) => <Record record={record} />}
      </OpenedRecord>
    </PagePane>
  );
}

function Record({ record }: { record: PatientRecord }) {
  const { timeZone } = useMe().clinic;
  const nowMs = useNowMs();
  const [kept, setKept] = useState(keptIn(useLocation().state));
  // The title of the window names no patient: other programs can read it.
  const heading = usePageHeading('Patient record');
  return (
    <>
      <RecordHead record={record} today={localDateOf(nowMs, timeZone)} headingRef={heading} />
      <KeptNotice text={kept} />
      <SafetyFacts person={record.identity} />
      <div className="grid gap-x-10 gap-y-8 @4xl/clinic:grid-cols-[minmax(0,1fr)_22rem]">
        <div className="grid content-start gap-8">
          <OperationFacts record={record} />
          <IdentityFacts record={record} />
          <TeamFacts record={record} />
        </div>
        <div className="grid content-start gap-8">
          <StateSection record={record} timeZone={timeZone} onMoved={setKept} />
          <InvitationSection record={record} nowMs={nowMs} timeZone={timeZone} onSent={setKept} />
          <CaregiverSection record={record} nowMs={nowMs} timeZone={timeZone} onDone={setKept} />
        </div>
      </div>
    </>
  );
}
