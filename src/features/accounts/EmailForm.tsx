import { useEffect } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { emailField } from '#shared/accounts/fields.ts';
import { Button } from '#src/components/Button.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { Refusal } from './Refusal.tsx';
import { fieldErrorOf, useRefusal } from './refusal.ts';

const body = z.object({ email: emailField });

type Props = {
  label: string;
  submitLabel: string;
  busy: boolean;
  error: Error | null;
  onEmail: (email: string) => void;
};

/** One e-mail address and a button. */
export function EmailForm({ label, submitLabel, busy, error, onEmail }: Props) {
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: schemaResolver(body),
    defaultValues: { email: '' },
  });
  const said = fieldErrorOf(error, 'email');
  useEffect(() => {
    if (said) setError('email', { message: said }, { shouldFocus: true });
  }, [said, error, setError]);
  const refusal = useRefusal(error);
  const submit = handleSubmit(({ email }) => {
    if (!busy) onEmail(email);
  });
  return (
    <form noValidate className="grid gap-5" onSubmit={(event) => void submit(event)}>
      <Refusal text={refusal} />
      <TextField
        {...register('email')}
        type="email"
        label={label}
        error={formState.errors.email?.message}
        autoComplete="email"
        autoCapitalize="none"
        spellCheck={false}
      />
      <Button type="submit" size="large" block busy={busy}>
        {submitLabel}
      </Button>
    </form>
  );
}
