import { useId } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { inviteStaffBody } from '#shared/people/contract.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { UnsavedGuard } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useChangeStaff } from './queries.ts';
import { emptyIsNothing } from './staff-fields.ts';

const { name, credential, phone, timeZone } = inviteStaffBody.shape;
const schema = z.strictObject({ name, credential, phone, timeZone });

type Values = z.input<typeof schema>;

const timeZones = Intl.supportedValuesOf('timeZone');

const valuesOf = (person: StaffPerson): Values => ({
  name: person.name,
  credential: person.credential,
  phone: person.phone,
  timeZone: person.timeZone,
});

type Props = { person: StaffPerson; onKept: (words: string) => void };

export function PersonDetailsForm({ person, onKept }: Props) {
  const change = useChangeStaff(person.id);
  const zonesId = useId();
  const { register, handleSubmit, setError, reset, formState } = useForm<Values>({
    resolver: schemaResolver(schema),
    defaultValues: valuesOf(person),
  });
  const { errors, isDirty } = formState;
  function submit(body: Values) {
    change.mutate(body, {
      onSuccess: (changed) => {
        reset(valuesOf(changed));
        onKept('The details are kept.');
      },
      onError: (error) => showFieldErrors(error, setError),
    });
  }
  return (
    <section aria-labelledby="details-heading">
      <SectionHeading id="details-heading" wire>
        Details
      </SectionHeading>
      <form noValidate className="mt-4 grid gap-5" onSubmit={(event) => void handleSubmit(submit)(event)}>
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
          autoComplete="off"
          error={errors.credential?.message}
        />
        <TextField
          {...register('phone', emptyIsNothing)}
          type="tel"
          label="Telephone"
          autoComplete="off"
          error={errors.phone?.message}
        />
        <TextField
          {...register('timeZone', emptyIsNothing)}
          label="Time zone"
          hint="Empty: the clinic’s."
          list={zonesId}
          autoComplete="off"
          error={errors.timeZone?.message}
        />
        <datalist id={zonesId}>
          {timeZones.map((zone) => (
            <option key={zone} value={zone} />
          ))}
        </datalist>
        <p className="text-sm text-ink-soft wrap-anywhere">
          E-mail: {person.email}. Only they change it, once they have signed in.
        </p>
        <Refused error={change.error} />
        <div>
          <Button type="submit" variant="outline" busy={change.isPending}>
            Save the details
          </Button>
        </div>
      </form>
      <UnsavedGuard when={isDirty} />
    </section>
  );
}
