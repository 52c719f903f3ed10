import { ClipboardList, Search, UserPlus, Users } from 'lucide-react';
import { useLocation } from 'react-router-dom';
import { may } from '#shared/access/permissions.ts';
import { matchesSearch } from '#shared/patients/search.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { keptIn } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { PagePane } from '#src/features/clinic/PagePane.tsx';
import { CaseloadFilters, useCaseloadFilter } from '#src/features/patients/CaseloadFilters.tsx';
import { useCaseloadSearch } from '#src/features/patients/caseload-search.ts';
import { PatientTable } from '#src/features/patients/PatientTable.tsx';
import { usePatients } from '#src/features/patients/queries.ts';
import type { PatientFilter } from '#src/features/patients/queries.ts';
import { useNowMs } from '#src/lib/now.ts';
import { refusalOf } from '#src/lib/refusal.ts';

const emptyWords: Record<PatientFilter, { title: string; why: string }> = {
  all: { title: 'No patients yet.', why: 'Enrol the first one, or a whole list.' },
  mine: { title: 'You are on no care team.', why: 'Patients appear here once you are on theirs.' },
  'never-started': {
    title: 'Everybody has started.',
    why: 'From the first day after surgery, those without a check-in stand here.',
  },
  paused: { title: 'Nobody is paused.', why: 'Patients who are in hospital or away stand here.' },
  discharged: {
    title: 'Nobody is discharged.',
    why: 'Patients whom the clinic no longer watches stand here.',
  },
};

/** The clinic's patients by name and state. */
export function CaseloadPage() {
  const { personId, roles, clinic } = useMe();
  const heading = usePageHeading('Caseload');
  const nowMs = useNowMs();
  const kept = keptIn(useLocation().state);
  const filter = useCaseloadFilter();
  const [search, setSearch] = useCaseloadSearch(personId);
  const list = usePatients(filter);
  const patients = list.data?.patients.filter((patient) => matchesSearch(patient, search));
  const mayOpen = may(roles, 'patient:read');
  const count = patients?.length === 1 ? '1 patient' : `${patients?.length ?? 0} patients`;
  return (
    <PagePane>
      <PageHeader
        title="Caseload"
        headingRef={heading}
        detail={<span role="status">{patients ? count : null}</span>}
        actions={
          may(roles, 'patient:write') ? (
            <>
              <LinkButton to="/caseload/import" variant="outline" icon={ClipboardList}>
                Enrol from a list
              </LinkButton>
              <LinkButton to="/caseload/new" icon={UserPlus}>
                Enrol a patient
              </LinkButton>
            </>
          ) : null
        }
      />
      <KeptNotice text={kept} />
      <CaseloadFilters
        withMine={mayOpen}
        neverStarted={list.data?.neverStarted}
        search={search}
        onSearch={setSearch}
      />
      {list.error && patients === undefined ? (
        <ErrorState
          title="The caseload could not be loaded."
          retry={{ label: 'Try again', onRetry: () => void list.refetch(), busy: list.isFetching }}
        >
          {refusalOf(list.error).title}
        </ErrorState>
      ) : null}
      {list.isPending ? <LoadingState label="The caseload is loading" lines={8} /> : null}
      {patients === undefined ? null : patients.length > 0 ? (
        <PatientTable patients={patients} mayOpen={mayOpen} nowMs={nowMs} timeZone={clinic.timeZone} />
      ) : search.trim() === '' ? (
        <EmptyState icon={Users} title={emptyWords[filter].title}>
          {emptyWords[filter].why}
        </EmptyState>
      ) : (
        <EmptyState
          icon={Search}
          title="Nobody has that name or chart number here."
          action={
            <Button
              variant="outline"
              onClick={() => {
                setSearch('');
                // The button goes with what it undoes; the focus must not be lost with it.
                heading.current?.focus();
              }}
            >
              Clear the search
            </Button>
          }
        >
          Try the beginning of the first or the last name, or look among all patients.
        </EmptyState>
      )}
    </PagePane>
  );
}
