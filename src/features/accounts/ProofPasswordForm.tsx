import { useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { PasswordField } from '#src/components/PasswordField.tsx';

type Props = {
  error: string | null;
  busy: boolean;
  /** `refused` marks what was typed, to be typed over. */
  onPassword: (password: string, refused: () => void) => void;
};

/** One's own password, once more. */
export function ProofPasswordForm({ error, busy, onPassword }: Props) {
  const { t } = useTranslation('accounts');
  const [password, setPassword] = useState('');
  const [missing, setMissing] = useState(false);
  const field = useRef<HTMLInputElement>(null);
  useEffect(() => field.current?.focus(), []);
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={(event) => {
        event.preventDefault();
        // The dialog stands in the page's tree, whose own form is not to be sent by it.
        event.stopPropagation();
        setMissing(password === '');
        if (password === '') field.current?.focus();
        else if (!busy) onPassword(password, () => field.current?.select());
      }}
    >
      <PasswordField
        ref={field}
        label={t('password')}
        error={missing ? t('proof.missing') : (error ?? undefined)}
        revealLabel={t('reveal')}
        autoComplete="current-password"
        value={password}
        onChange={({ target }) => {
          setPassword(target.value);
          setMissing(false);
        }}
      />
      <Button type="submit" size="large" block busy={busy}>
        {t('proof.go')}
      </Button>
    </form>
  );
}
