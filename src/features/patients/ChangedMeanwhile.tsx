import { useState } from 'react';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { usePatient } from './queries.ts';

type Props = {
  patientId: string;
  /** What the server says about it. */
  sentence: string;
  onPresent: (record: PatientRecord) => void;
};

/** A colleague was faster. What was typed stays until its writer asks for the present record. */
export function ChangedMeanwhile({ patientId, sentence, onPresent }: Props) {
  const { refetch } = usePatient(patientId);
  const [loading, setLoading] = useState<'no' | 'yes' | 'failed'>('no');
  async function load() {
    setLoading('yes');
    const { data, isSuccess } = await refetch();
    if (isSuccess) onPresent(data);
    else setLoading('failed');
  }
  return (
    <Banner
      tone="warning"
      title={sentence}
      announce="alert"
      action={
        <Button variant="outline" busy={loading === 'yes'} onClick={() => void load()}>
          Load the present record
        </Button>
      }
    >
      {loading === 'failed'
        ? 'The present record could not be loaded. Try again.'
        : 'What you typed stays here, and is not saved. The present record takes its place once you load it.'}
    </Banner>
  );
}
