import { useEffect, useState } from 'react';
import { FormProvider, useForm } from 'react-hook-form';
import { z } from 'zod';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { careTeamField, operationCardFields } from '#shared/patients/record.ts';
import { Refused } from '#src/app/Refused.tsx';
import { UnsavedGuard } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { ErrorSummary } from '#src/components/ErrorSummary.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { listErrors, showFieldErrors } from '#src/lib/form-errors.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { CareTeamField } from './CareTeamField.tsx';
import { ChangedMeanwhile } from './ChangedMeanwhile.tsx';
import { IdentityFields } from './IdentityFields.tsx';
import { OperationFields } from './OperationFields.tsx';
import { identityForm, valuesOf } from './patient-fields.ts';
import { useChangePatient } from './queries.ts';

const schema = z.strictObject({
  identity: identityForm,
  operation: z.strictObject(operationCardFields),
  careTeam: careTeamField,
});

type Values = z.input<typeof schema>;
type Body = z.output<typeof schema>;

const isConflict = (error: Error | null): error is ApiProblem =>
  error instanceof ApiProblem && error.code === 'state-conflict';

type Props = { record: PatientRecord; onChanged: () => void };

/**
 * The record's form, as the record stood when the form was begun: one that is fetched again meanwhile changes
 * neither what stands in the fields nor the revision that it is sent with.
 */
export function ChangePatientForm({ record, onChanged }: Props) {
  const [{ begun, times }, setBegun] = useState({ begun: record, times: 0 });
  return (
    <RecordForm
      // Fields keep a state of their own too, so another record is another form.
      key={times}
      record={begun}
      isAnew={times > 0}
      onPresent={(present) => setBegun({ begun: present, times: times + 1 })}
      onChanged={onChanged}
    />
  );
}

type FormProps = Props & { isAnew: boolean; onPresent: (record: PatientRecord) => void };

/** A refusal leaves what was typed as it is. */
function RecordForm({ record, isAnew, onPresent, onChanged }: FormProps) {
  const change = useChangePatient(record.id);
  const form = useForm<Values, unknown, Body>({
    resolver: schemaResolver(schema),
    shouldFocusError: false,
    defaultValues: valuesOf(record),
  });
  const { errors, isDirty } = form.formState;
  const { setFocus } = form;
  // Whoever asked for the present record reads it from the top.
  useEffect(() => {
    if (isAnew) setFocus('identity.name');
  }, [isAnew, setFocus]);
  function submit(body: Body) {
    change.mutate(
      { ...body, revision: record.revision },
      {
        onSuccess: onChanged,
        onError: (error) => showFieldErrors(error, form.setError),
      },
    );
  }
  return (
    <FormProvider {...form}>
      <form noValidate className="grid gap-10" onSubmit={(event) => void form.handleSubmit(submit)(event)}>
        <IdentityFields />
        <OperationFields />
        <CareTeamField members={record.careTeam} />
        <div className="grid gap-4">
          <ErrorSummary title="Nothing is changed yet. Put this right:" items={listErrors(errors)} />
          {isConflict(change.error) ? (
            <ChangedMeanwhile patientId={record.id} sentence={change.error.message} onPresent={onPresent} />
          ) : (
            <Refused error={change.error} />
          )}
          <div className="flex flex-wrap justify-end gap-3">
            <LinkButton to={`/caseload/${record.id}`} variant="outline">
              Cancel
            </LinkButton>
            <Button type="submit" busy={change.isPending}>
              Save the record
            </Button>
          </div>
        </div>
      </form>
      <UnsavedGuard when={isDirty} />
    </FormProvider>
  );
}
