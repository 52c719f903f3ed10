import { useState } from 'react';
import { FormProvider, useForm } from 'react-hook-form';
import { enrolPatientBody } from '#shared/patients/contract.ts';
import type { EnrolPatient, PatientRecord } from '#shared/patients/contract.ts';
import { useMe } from '#src/app/session.tsx';
import { Refused } from '#src/app/Refused.tsx';
import { UnsavedGuard } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { ErrorSummary } from '#src/components/ErrorSummary.tsx';
import { listErrors, showFieldErrors } from '#src/lib/form-errors.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { CareTeamField } from './CareTeamField.tsx';
import { FormLine, FormRadios, FormSection } from './form-parts.tsx';
import { IdentityFields } from './IdentityFields.tsx';
import { OperationFields } from './OperationFields.tsx';
import { emptyIdentity, emptyOperation, identityForm } from './patient-fields.ts';
import type { PatientValues } from './patient-fields.ts';
import { useEnrolPatient } from './queries.ts';
import { consentWords } from './words.ts';

const schema = enrolPatientBody.extend({ identity: identityForm });

const inviteWords: Record<EnrolPatient['invite'], string> = {
  email: 'By e-mail, now',
  letter: 'By letter, printed here',
  'not-yet': 'Not yet',
};

type Props = { onEnrolled: (record: PatientRecord, invite: EnrolPatient['invite']) => void };

/** Everything that a record begins with, on one page. A refusal leaves what was typed as it is. */
export function EnrolPatientForm({ onEnrolled }: Props) {
  const { clinic } = useMe();
  const enrol = useEnrolPatient();
  const [id] = useState(() => crypto.randomUUID());
  const form = useForm<PatientValues, unknown, EnrolPatient>({
    resolver: schemaResolver(schema),
    // What is wrong is listed at the end, where the button was pressed, with a way to each field.
    shouldFocusError: false,
    defaultValues: {
      id,
      identity: emptyIdentity(clinic.timeZone),
      operation: emptyOperation,
      careTeam: [],
      consent: { on: '' },
    },
  });
  const { errors, isDirty } = form.formState;
  const wasSentBefore = enrol.error instanceof ApiProblem && enrol.error.code === 'id-conflict';

  function submit(body: EnrolPatient) {
    enrol.mutate(body, {
      onSuccess: (record) => onEnrolled(record, body.invite),
      onError: (error) => showFieldErrors(error, form.setError),
    });
  }
  return (
    <FormProvider {...form}>
      <form noValidate className="grid gap-10" onSubmit={(event) => void form.handleSubmit(submit)(event)}>
        <IdentityFields />
        <OperationFields />
        <CareTeamField />
        <FormSection
          title="Consent"
          note="The patient agrees that the clinic looks after them with Espalier between visits."
        >
          <FormLine name="consent.on" label="Agreed on" type="date" />
          <FormRadios name="consent.how" label="How" words={consentWords} />
        </FormSection>
        <FormSection title="Invitation" note="It can be used for 14 days, and sent again at any time.">
          <div className="@3xl/clinic:col-span-2">
            <FormRadios name="invite" label="How is the patient invited?" words={inviteWords} />
          </div>
        </FormSection>
        <div className="grid gap-4">
          <ErrorSummary title="The patient is not enrolled yet. Put this right:" items={listErrors(errors)} />
          <Refused error={enrol.error} />
          {wasSentBefore ? (
            <p className="font-bold">
              The patient is enrolled with what was sent the first time. Find the record in the caseload, and
              change it there.
            </p>
          ) : null}
          <div className="flex justify-end">
            <Button type="submit" busy={enrol.isPending}>
              Enrol the patient
            </Button>
          </div>
        </div>
      </form>
      <UnsavedGuard when={isDirty} />
    </FormProvider>
  );
}
