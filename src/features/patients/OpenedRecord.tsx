import type { ReactNode } from 'react';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { ApiProblem, mayPassLater } from '#src/lib/problem.ts';
import { refusalOf } from '#src/lib/refusal.ts';
import { usePatient } from './queries.ts';
import { ReasonNeeded } from './ReasonNeeded.tsx';

type Props = { patientId: string; children: (record: PatientRecord) => ReactNode };

/** A record once it may be seen; before that why not, or the question why somebody outside the team opens it. */
export function OpenedRecord({ patientId, children }: Props) {
  const { data, error, isFetching, refetch } = usePatient(patientId);
  const problem = error instanceof ApiProblem ? error.code : null;
  if (problem === 'reason-needed') return <ReasonNeeded patientId={patientId} />;
  // What was opened is no longer shown once the server says that it may not be.
  if (data && problem !== 'not-found' && problem !== 'forbidden') return children(data);
  if (!error) return <LoadingState label="The record is loading" lines={8} />;
  return (
    <ErrorState
      title={problem === 'not-found' ? 'There is no such record.' : 'The record could not be loaded.'}
      retry={
        mayPassLater(error)
          ? { label: 'Try again', onRetry: () => void refetch(), busy: isFetching }
          : undefined
      }
    >
      {refusalOf(error).title}
    </ErrorState>
  );
}
