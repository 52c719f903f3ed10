import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useForm } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { signInBody } from '#shared/accounts/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { PasswordField } from '#src/components/PasswordField.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { ApiProblem } from '#src/lib/problem.ts';
import { useSignIn } from './queries.ts';
import { useRefusal } from './refusal.ts';

const fields = ['email', 'password'] as const;

export function SignInForm() {
  const { t } = useTranslation('accounts');
  const signIn = useSignIn();
  const refusal = useRefusal(signIn.error);
  const { register, handleSubmit, setError, setFocus, formState } = useForm({
    resolver: schemaResolver(signInBody),
    defaultValues: { email: '', password: '', staySignedIn: false },
  });
  const { errors } = formState;

  const submit = handleSubmit((values) => {
    signIn.mutate(values, {
      onError: (error) => {
        const listed = error instanceof ApiProblem ? error.fieldErrors : [];
        for (const field of fields) {
          const message = listed.find((entry) => entry.field === field)?.message;
          if (message) setError(field, { message });
        }
        setFocus('password', { shouldSelect: true });
      },
    });
  });

  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-5">
      {/* The region stands from the start, or what arrives in it is not announced. */}
      <div role="alert" className="empty:hidden">
        {refusal ? <Banner tone="danger">{refusal}</Banner> : null}
      </div>
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
      <div>
        <Checkbox {...register('staySignedIn')} label={t('stay')} aria-describedby="stay-help" />
        <p id="stay-help" className="pl-9 text-sm text-ink-soft">
          {t('stayHelp')}
        </p>
      </div>
      <Button type="submit" size="large" block busy={signIn.isPending}>
        {t('signIn')}
      </Button>
    </form>
  );
}
