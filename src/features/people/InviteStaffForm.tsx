import { useState } from 'react';
import { Controller, useForm, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import { inviteStaffBody } from '#shared/people/contract.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { isGuardedRole, staffRoles } from '#shared/people/two-person-acts.ts';
import { Refused } from '#src/app/Refused.tsx';
import { CheckTile } from '#src/components/CheckTile.tsx';
import { FormDialog } from '#src/app/FormDialog.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useInviteStaff } from './queries.ts';
import { emptyIsNothing } from './staff-fields.ts';
import { roleDetails, roleWords } from './words.ts';

/** The server asks for a reason where a role is guarded; here it is asked for before anything is sent. */
const schema = inviteStaffBody.refine(
  ({ roles, reason }) => reason !== undefined || !roles.some(isGuardedRole),
  {
    path: ['reason'],
    message: 'Say why, for the second person.',
  },
);

type Values = z.input<typeof schema>;
type Body = z.output<typeof schema>;

type Props = { onClose: () => void; onInvited: (person: StaffPerson) => void };

/** Somebody new. A refusal leaves what was typed as it is. */
export function InviteStaffForm({ onClose, onInvited }: Props) {
  const invite = useInviteStaff();
  const [id] = useState(() => crypto.randomUUID());
  const { control, register, handleSubmit, setError, formState } = useForm<Values, unknown, Body>({
    resolver: schemaResolver(schema),
    defaultValues: { id, name: '', credential: null, email: '', phone: null, timeZone: null, roles: [] },
  });
  const { errors, isDirty } = formState;
  const guarded = useWatch({ control, name: 'roles' }).filter(isGuardedRole);
  useBusyWhile(isDirty);

  function submit(body: Body) {
    invite.mutate(body, { onSuccess: onInvited, onError: (error) => showFieldErrors(error, setError) });
  }
  return (
    <FormDialog
      title="Invite somebody"
      description="An invitation goes to the e-mail address. It can be used for 72 hours."
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
        {...register('credential', emptyIsNothing)}
        label="Title"
        hint="Such as PT, DPT. Empty where there is none."
        autoComplete="off"
        error={errors.credential?.message}
      />
      <TextField
        {...register('email')}
        type="email"
        label="E-mail"
        autoComplete="off"
        error={errors.email?.message}
      />
      <TextField
        {...register('phone', emptyIsNothing)}
        type="tel"
        label="Telephone"
        hint="For pages by SMS and by call. It can be added later."
        autoComplete="off"
        error={errors.phone?.message}
      />
      <Controller
        control={control}
        name="roles"
        render={({ field, fieldState: { error } }) => (
          <fieldset className="grid min-w-0 gap-2" aria-describedby={error ? 'roles-error' : undefined}>
            <legend className="mb-2 font-bold">Roles</legend>
            {staffRoles.map((role) => (
              <CheckTile
                key={role}
                label={roleWords[role]}
                detail={roleDetails[role]}
                checked={field.value.includes(role)}
                onChange={({ target }) =>
                  field.onChange(
                    target.checked ? [...field.value, role] : field.value.filter((chosen) => chosen !== role),
                  )
                }
              />
            ))}
            {error ? (
              <p id="roles-error" className="text-sm font-bold text-clay">
                {error.message}
              </p>
            ) : null}
          </fieldset>
        )}
      />
      {guarded.length > 0 ? (
        <TextArea
          {...register('reason', { shouldUnregister: true })}
          label={`Why ${guarded.map((role) => roleWords[role]).join(' and ')}?`}
          hint="A second person reads this and confirms. Until then the role is not given."
          rows={2}
          dir="auto"
          error={errors.reason?.message}
        />
      ) : null}
      <Refused error={invite.error} />
    </FormDialog>
  );
}
