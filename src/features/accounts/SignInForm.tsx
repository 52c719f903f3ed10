import { schemaResolver } from '#src/lib/schema-resolver.ts';
import type { ReactNode } from 'react';
import { useForm } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { signInBody } from '#shared/accounts/contract.ts';
import type { SignInStep } from '#shared/accounts/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { PasswordField } from '#src/components/PasswordField.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useSignIn } from './queries.ts';
import { Refusal } from './Refusal.tsx';
import { fieldErrorOf, useRefusal } from './refusal.ts';

const fields = ['email', 'password'] as const;

type Props = {
  staySignedIn: boolean;
  /** The passkey is the first way on this device, and this one the other. */
  second: boolean;
  onStep: (step: SignInStep) => void;
  /** Stands above the button. */
  children?: ReactNode;
};

export function SignInForm({ staySignedIn, second, onStep, children }: Props) {
  const { t } = useTranslation('accounts');
  const signIn = useSignIn();
  const refusal = useRefusal(signIn.error);
  const { register, handleSubmit, setError, setFocus, formState } = useForm({
    resolver: schemaResolver(signInBody),
    defaultValues: { email: '', password: '', staySignedIn: false },
  });
  const { errors } = formState;

  const submit = handleSubmit((values) => {
    signIn.mutate(
      { ...values, staySignedIn },
      {
        onSuccess: onStep,
        onError: (error) => {
          for (const field of fields) {
            const message = fieldErrorOf(error, field);
            if (message) setError(field, { message });
          }
          setFocus('password', { shouldSelect: true });
        },
      },
    );
  });

  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-5">
      <Refusal text={refusal} />
      <TextField
        {...register('email')}
        type="email"
        label={t('email')}
        error={errors.email?.message}
        autoComplete="username"
        autoCapitalize="none"
        spellCheck={false}
      />
      <PasswordField
        {...register('password')}
        label={t('password')}
        error={errors.password?.message}
        revealLabel={t('reveal')}
        autoComplete="current-password"
      />
      {children}
      <Button
        type="submit"
        size="large"
        variant={second ? 'outline' : 'primary'}
        block
        busy={signIn.isPending}
      >
        {t('signIn')}
      </Button>
    </form>
  );
}
