import { useRef, useState } from 'react';
import type { RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { SixDigitField } from '#src/components/SixDigitField.tsx';

type Props = {
  label: string;
  hint?: string;
  /** What the server said of the last code. */
  error?: string | null;
  submitLabel: string;
  busy: boolean;
  /** For whoever moves the focus there. */
  fieldRef?: RefObject<HTMLInputElement | null>;
  /** `refused` makes room for the next code. */
  onCode: (code: string, refused: () => void) => void;
};

/** Sends a code of six digits at its sixth, and makes room for the next one where it was refused. */
export function SixDigitForm({ label, hint, error, submitLabel, busy, fieldRef, onCode }: Props) {
  const { t } = useTranslation('accounts');
  const [code, setCode] = useState('');
  const [short, setShort] = useState(false);
  const ownRef = useRef<HTMLInputElement>(null);
  const field = fieldRef ?? ownRef;
  function makeRoom() {
    setCode('');
    field.current?.focus();
  }
  function send(complete: string) {
    if (busy) return;
    setShort(complete.length < 6);
    if (complete.length < 6) field.current?.focus();
    else onCode(complete, makeRoom);
  }
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={(event) => {
        event.preventDefault();
        // A form inside a dialog stands in the page's tree too, and is not to send the page's own.
        event.stopPropagation();
        send(code);
      }}
    >
      <SixDigitField
        ref={field}
        label={label}
        hint={hint}
        error={short ? t('second.missing') : (error ?? undefined)}
        value={code}
        onChange={(next) => {
          setCode(next);
          setShort(false);
        }}
        onComplete={send}
      />
      <Button type="submit" size="large" block busy={busy}>
        {submitLabel}
      </Button>
    </form>
  );
}
