import { useEffect } from 'react';
import type { ReactNode } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { z } from 'zod';
import { newPasswordField, passwordRules } from '#shared/accounts/fields.ts';
import { Button } from '#src/components/Button.tsx';
import { PasswordField } from '#src/components/PasswordField.tsx';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { Refusal } from './Refusal.tsx';
import { fieldErrorOf, useRefusal } from './refusal.ts';

const body = z.object({ password: newPasswordField });

type Props = {
  /** Patients choose a passphrase, staff and whoever changes one a password: the rules are the same. */
  label: string;
  submitLabel: string;
  busy: boolean;
  error: Error | null;
  spent?: string;
  /** Whose password it is, so that a password manager keeps it under the right name. */
  email?: string | null;
  onPassword: (password: string) => void;
  /** Whatever else must be right first; it says so itself. */
  mayGoOn?: () => boolean;
  /** Stands above the field. */
  children?: ReactNode;
};

/** A new password: what was typed stays whatever the server says of it, and the reason stands beside the field. */
export function NewPasswordForm(props: Props) {
  const { label, submitLabel, busy, error, spent, email, onPassword, mayGoOn, children } = props;
  const { t } = useTranslation('accounts');
  const { register, handleSubmit, setError, control, formState } = useForm({
    resolver: schemaResolver(body),
    defaultValues: { password: '' },
  });
  const said = fieldErrorOf(error, 'password');
  useEffect(() => {
    if (said) setError('password', { message: said }, { shouldFocus: true });
  }, [said, error, setError]);
  const refusal = useRefusal(error, { spent });
  const length = [...useWatch({ control, name: 'password' }).normalize('NFC')].length;
  const submit = handleSubmit(({ password }) => {
    if (!busy && (mayGoOn?.() ?? true)) onPassword(password);
  });
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={(event) => {
        // Asked here as well, so that everything that is missing is told at once.
        mayGoOn?.();
        void submit(event);
      }}
    >
      <Refusal text={refusal} />
      {children}
      {email ? (
        <input type="text" autoComplete="username" value={email} readOnly hidden aria-hidden tabIndex={-1} />
      ) : null}
      <div className="grid gap-1.5">
        <PasswordField
          {...register('password')}
          label={label}
          hint={t('passphrase.hint')}
          error={formState.errors.password?.message}
          revealLabel={t('passphrase.reveal')}
          autoComplete="new-password"
        />
        <p className="text-sm text-ink-soft">
          {length >= passwordRules.shortest
            ? t('passphrase.meterDone')
            : t('passphrase.meterStart', { count: length })}
        </p>
      </div>
      <Button type="submit" size="large" block busy={busy}>
        {submitLabel}
      </Button>
    </form>
  );
}
