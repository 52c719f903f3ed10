import { schemaResolver } from '#src/lib/schema-resolver.ts';
import type { ReactNode } from 'react';
import { Controller, useForm, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import { closeFlagBody } from '#shared/triage/contract.ts';
import type { FlagCase } from '#shared/triage/contract.ts';
import { outcomeNeeds, outcomes } from '#shared/triage/lifecycle.ts';
import { FormDialog } from '#src/app/FormDialog.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { useCloseFlag } from './queries.ts';
import { RefusalBanner } from './RefusalBanner.tsx';
import { outcomeWords } from './words.ts';

type Values = z.input<typeof closeFlagBody>;
type Body = z.output<typeof closeFlagBody>;

const fields = ['outcome', 'worthRaising', 'note'] as const satisfies (keyof Values)[];

const outcomeOptions = outcomes.map((value) => ({ value, label: outcomeWords[value] }));
const worthOptions = [
  { value: 'yes' as const, label: 'Yes' },
  { value: 'no' as const, label: 'No' },
];

/** The form is longer than a small screen, and what is wrong may stand above what is seen. */
function focusFirst(form: HTMLFormElement, wrong: Partial<Record<keyof Values, unknown>>): void {
  const first = fields.find((name) => wrong[name] !== undefined);
  form.querySelector<HTMLElement>(`[name="${first ?? ''}"]`)?.focus();
}

type Props = {
  flag: FlagCase;
  onOpenChange: (open: boolean) => void;
  onClosed: () => void;
  /** What a colleague has done with the flag since the form was opened. */
  notice: ReactNode;
};

/** Ends a flag with an outcome. A refusal leaves the form as it is, with what is wrong beside the field. */
export function CloseFlagDialog({ flag, onOpenChange, onClosed, notice }: Props) {
  const close = useCloseFlag(flag.id);
  const { control, register, handleSubmit, setError, formState } = useForm<Values, unknown, Body>({
    shouldFocusError: false,
    resolver: schemaResolver(closeFlagBody),
    defaultValues: { note: '' },
  });
  useBusyWhile(formState.isDirty);
  const outcome = useWatch({ control, name: 'outcome' });
  const { errors } = formState;

  function submit(body: Body) {
    close.mutate(body, {
      onSuccess: onClosed,
      onError: (error) => {
        if (!(error instanceof ApiProblem)) return;
        error.fieldErrors.forEach(({ field, message }) => {
          const known = fields.find((name) => name === field);
          if (known) setError(known, { message });
        });
      },
    });
  }
  const isFieldProblem = close.error instanceof ApiProblem && close.error.fieldErrors.length > 0;

  return (
    <FormDialog
      title={`Close the flag of ${flag.patient.name}`}
      description="It leaves the round. Something new about this person comes back as a flag."
      submitLabel="Close the flag"
      busy={close.isPending}
      onSubmit={(event) => {
        const form = event.currentTarget;
        void handleSubmit(submit, (wrong) => focusFirst(form, wrong))(event);
      }}
      onClose={() => onOpenChange(false)}
    >
      <Controller
        control={control}
        name="outcome"
        render={({ field }) => (
          <RadioTiles
            legend="Outcome"
            name={field.name}
            options={outcomeOptions}
            columns={2}
            value={field.value ?? null}
            onChange={field.onChange}
            error={errors.outcome?.message}
          />
        )}
      />
      <Controller
        control={control}
        name="worthRaising"
        render={({ field }) => (
          <RadioTiles
            legend="Was it worth raising?"
            name={field.name}
            options={worthOptions}
            columns={2}
            value={field.value ?? null}
            onChange={field.onChange}
            error={errors.worthRaising?.message}
          />
        )}
      />
      <TextArea
        {...register('note')}
        label="Note for the record"
        hint={(outcome && outcomeNeeds[outcome]) ?? 'If there is more to say.'}
        error={errors.note?.message}
        dir="auto"
      />
      {close.isPending ? null : notice}
      {isFieldProblem ? null : <RefusalBanner error={close.error} kept="What you chose is still here." />}
    </FormDialog>
  );
}
