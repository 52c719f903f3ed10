import { useState } from 'react';
import { Controller, useForm } from 'react-hook-form';
import type { z } from 'zod';
import { clinicInviteCaregiverBody } from '#shared/caregivers/contract.ts';
import type { ClinicCaregiverCard } from '#shared/patients/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { FormDialog } from '#src/app/FormDialog.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useInviteCaregiver } from './queries.ts';

type Values = z.input<typeof clinicInviteCaregiverBody>;
type Body = z.output<typeof clinicInviteCaregiverBody>;

const ways = [
  { value: 'email' as const, label: 'By e-mail, now' },
  { value: 'letter' as const, label: 'By letter, printed here' },
];

type Props = {
  patientId: string;
  patientName: string;
  onClose: () => void;
  onInvited: (card: ClinicCaregiverCard, byEmail: boolean) => void;
};

/** The clinic lets somebody in on the patient's behalf, so it records how the patient agreed. */
export function InviteCaregiverForm({ patientId, patientName, onClose, onInvited }: Props) {
  const invite = useInviteCaregiver(patientId);
  const [id] = useState(() => crypto.randomUUID());
  const { control, register, handleSubmit, setError, formState } = useForm<Values, unknown, Body>({
    resolver: schemaResolver(clinicInviteCaregiverBody),
    defaultValues: {
      id,
      name: '',
      email: '',
      relationship: '',
      mayCheckIn: false,
      mayMessage: false,
      until: null,
      consent: '',
    },
  });
  const { errors, isDirty } = formState;
  useBusyWhile(isDirty);

  function submit(body: Body) {
    invite.mutate(body, {
      onSuccess: (card) => onInvited(card, body.byEmail),
      onError: (error) => showFieldErrors(error, setError),
    });
  }
  return (
    <FormDialog
      title="Invite a caregiver"
      description={`They see the record of ${patientName}, and everything they do there is marked as theirs.`}
      submitLabel="Invite"
      busy={invite.isPending}
      onSubmit={(event) => void handleSubmit(submit)(event)}
      onClose={onClose}
    >
      <TextField
        {...register('name')}
        label="Name"
        dir="auto"
        autoComplete="off"
        error={errors.name?.message}
      />
      <TextField
        {...register('email')}
        type="email"
        label="E-mail"
        hint="Their own, not the patient’s."
        autoComplete="off"
        error={errors.email?.message}
      />
      <TextField
        {...register('relationship')}
        label="Who they are to the patient"
        hint="For example daughter, neighbour."
        autoComplete="off"
        error={errors.relationship?.message}
      />
      <fieldset className="min-w-0">
        <legend className="font-bold">Besides seeing the record, they may</legend>
        <Checkbox {...register('mayCheckIn')} label="answer check-ins for the patient" />
        <Checkbox {...register('mayMessage')} label="write messages to the clinic" />
      </fieldset>
      <TextField
        {...register('until', { setValueAs: (date: string | null) => (date === '' ? null : date) })}
        type="date"
        label="Until"
        hint="The last day. Empty: until somebody ends it."
        error={errors.until?.message}
      />
      <TextArea
        {...register('consent')}
        label="How and when did the patient agree?"
        rows={2}
        dir="auto"
        error={errors.consent?.message}
      />
      <Controller
        control={control}
        name="byEmail"
        render={({ field, fieldState: { error } }) => (
          <RadioTiles
            legend="How are they invited?"
            name={field.name}
            options={ways}
            columns={2}
            value={field.value === undefined ? null : field.value ? 'email' : 'letter'}
            onChange={(way) => field.onChange(way === 'email')}
            error={error ? 'Choose how they are invited.' : undefined}
          />
        )}
      />
      <Refused error={invite.error} />
    </FormDialog>
  );
}
