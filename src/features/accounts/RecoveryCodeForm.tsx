import { useState } from 'react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { CodeField } from '#src/components/CodeField.tsx';

type Props = {
  error?: string | null;
  busy: boolean;
  fieldRef: RefObject<HTMLInputElement | null>;
  /** `refused` marks what was typed, to be put right or typed over. */
  onCode: (code: string, refused: () => void) => void;
};

export function RecoveryCodeForm({ error, busy, fieldRef, onCode }: Props) {
  const { t } = useTranslation('accounts');
  const [code, setCode] = useState('');
  const [missing, setMissing] = useState(false);
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={(event) => {
        event.preventDefault();
        const typed = code.trim();
        // The shortest text that could be one: anything less was sent by mistake.
        setMissing(typed.length < 6);
        if (typed.length < 6) fieldRef.current?.focus();
        else if (!busy) onCode(typed, () => fieldRef.current?.select());
      }}
    >
      <CodeField
        ref={fieldRef}
        label={t('second.recoveryLabel')}
        hint={t('second.recoveryHelp')}
        error={missing ? t('second.missingRecovery') : (error ?? undefined)}
        value={code}
        onChange={({ target }) => {
          setCode(target.value);
          setMissing(false);
        }}
        autoComplete="off"
        autoCapitalize="none"
      />
      <Button type="submit" size="large" block busy={busy}>
        {t('second.go')}
      </Button>
    </form>
  );
}
