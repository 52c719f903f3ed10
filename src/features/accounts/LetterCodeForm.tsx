import { useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { CodeField } from '#src/components/CodeField.tsx';
import { useLook } from './invitation-queries.ts';
import type { InvitationKey, SeenInvitation } from './invitation-queries.ts';
import { readLetterCode } from './letter-code.ts';
import { Refusal } from './Refusal.tsx';
import { fieldErrorOf, isCode, useRefusal } from './refusal.ts';

type Props = { onFound: (invitation: InvitationKey, seen: SeenInvitation) => void };

/** The code of the letter. What was typed stays until it is right. */
export function LetterCodeForm({ onFound }: Props) {
  const { t } = useTranslation('accounts');
  const look = useLook();
  const [text, setText] = useState('');
  const [mistake, setMistake] = useState<string | null>(null);
  const field = useRef<HTMLInputElement>(null);
  const unknown = isCode(look.error, 'link-spent', 'not-found', 'wrong-code');
  const refusal = useRefusal(look.error);
  const said = unknown ? t('start.unknown') : fieldErrorOf(look.error, 'code');
  const error = mistake ?? said;
  function submit() {
    if (look.isPending) return;
    const read = readLetterCode(text);
    if ('wrong' in read) {
      look.reset();
      setMistake(read.wrong === 'length' ? t('start.length', { count: read.typed }) : t('start.characters'));
      field.current?.focus();
      return;
    }
    look.mutate(read, {
      onSuccess: (seen) => onFound(read, seen),
      onError: () => field.current?.focus(),
    });
  }
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      <Refusal text={said ? null : refusal} />
      <CodeField
        ref={field}
        label={t('start.label')}
        hint={t('start.hint')}
        error={error}
        value={text}
        onChange={({ target }) => {
          setText(target.value.toUpperCase());
          setMistake(null);
        }}
        autoComplete="off"
        autoCapitalize="characters"
      />
      <Button type="submit" size="large" block busy={look.isPending}>
        {t('start.go')}
      </Button>
    </form>
  );
}
