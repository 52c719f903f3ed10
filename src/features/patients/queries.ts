import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { clinicEndCaregiver, clinicInviteCaregiver } from '#shared/caregivers/contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import type {
  changePatient,
  enrolPatient,
  getPatient,
  listClinicians,
  listPatients,
  movePatient,
  openChart,
  patientFilters,
  PatientRecord,
  reinvitePatient,
} from '#shared/patients/contract.ts';
import type { importPatients, previewImport } from '#shared/patients/import-contract.ts';
import { useProven } from '#src/app/proof.tsx';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

export type PatientFilter = (typeof patientFilters)[number];

const patientKeys = {
  list: (filter: PatientFilter) => [...queryPrefixes.patients, 'list', filter],
  record: (patientId: string) => [...queryPrefixes.patients, 'record', patientId],
  clinicians: [...queryPrefixes.patients, 'clinicians'],
} as const;

/** While another filter is on its way the former list stays, so that nothing jumps. */
export const usePatients = (filter: PatientFilter) =>
  useQuery({
    queryKey: patientKeys.list(filter),
    queryFn: ({ signal }) =>
      call<typeof listPatients>('get', '/api/patients', { query: { filter } }, { signal }),
    placeholderData: keepPreviousData,
  });

export const usePatient = (patientId: string) =>
  useQuery({
    queryKey: patientKeys.record(patientId),
    queryFn: ({ signal }) =>
      call<typeof getPatient>('get', '/api/patients/:patientId', { params: { patientId } }, { signal }),
  });

export const useClinicians = () =>
  useQuery({
    queryKey: patientKeys.clinicians,
    queryFn: async ({ signal }) =>
      (await call<typeof listClinicians>('get', '/api/clinicians', {}, { signal })).clinicians,
  });

/** A write on patients. Done or refused, what is on the screen is fetched again. */
function usePatientWrite<Input, Output>(write: (input: Input) => Promise<Output>) {
  const queryClient = useQueryClient();
  const withProof = useProven();
  return useMutation({
    mutationFn: (input: Input) => withProof(() => write(input)),
    onSettled: () => queryClient.invalidateQueries({ queryKey: queryPrefixes.patients }),
  });
}

/** The answer of a write is the record itself, and stands on the screen before it is fetched again. */
function useRecordWrite<Input>(write: (input: Input) => Promise<PatientRecord>) {
  const queryClient = useQueryClient();
  return usePatientWrite(async (input: Input) => {
    const record = await write(input);
    queryClient.setQueryData(patientKeys.record(record.id), record);
    return record;
  });
}

export const useEnrolPatient = () =>
  useRecordWrite((body: RequestOf<typeof enrolPatient>['body']) =>
    call<typeof enrolPatient>('post', '/api/patients', { body }),
  );

export const useChangePatient = (patientId: string) =>
  useRecordWrite((body: RequestOf<typeof changePatient>['body']) =>
    call<typeof changePatient>('put', '/api/patients/:patientId', { params: { patientId }, body }),
  );

export const useMovePatient = (patientId: string) =>
  useRecordWrite((body: RequestOf<typeof movePatient>['body']) =>
    call<typeof movePatient>('post', '/api/patients/:patientId/moves', { params: { patientId }, body }),
  );

export const useOpenChart = (patientId: string) =>
  usePatientWrite((reason: string) =>
    call<typeof openChart>('post', '/api/patients/:patientId/openings', {
      params: { patientId },
      body: { reason },
    }),
  );

export const useReinvitePatient = () =>
  usePatientWrite(({ patientId, byEmail }: { patientId: string; byEmail: boolean }) =>
    call<typeof reinvitePatient>('post', '/api/patients/:patientId/invitations', {
      params: { patientId },
      body: { byEmail },
    }),
  );

export const useInviteCaregiver = (patientId: string) =>
  usePatientWrite((body: RequestOf<typeof clinicInviteCaregiver>['body']) =>
    call<typeof clinicInviteCaregiver>('post', '/api/patients/:patientId/caregivers', {
      params: { patientId },
      body,
    }),
  );

export const useEndCaregiver = (patientId: string) =>
  usePatientWrite((caregiverId: string) =>
    call<typeof clinicEndCaregiver>('delete', '/api/patients/:patientId/caregivers/:caregiverId', {
      params: { patientId, caregiverId },
    }),
  );

/** Reads a pasted list; nothing is kept on either side. */
export const usePreviewImport = () =>
  useMutation({
    mutationFn: (text: string) =>
      call<typeof previewImport>('post', '/api/patient-imports/preview', { body: { text } }),
  });

export const useImportPatients = () =>
  usePatientWrite((body: RequestOf<typeof importPatients>['body']) =>
    call<typeof importPatients>('post', '/api/patient-imports', { body }),
  );
