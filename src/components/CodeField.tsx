import { useId } from 'react';
import type { ComponentProps } from 'react';
import { Field, describedBy, fieldClass } from './Field.tsx';
import type { FieldText } from './Field.tsx';

type Props = Omit<ComponentProps<'input'>, 'className' | 'type' | 'aria-describedby' | 'aria-invalid'> &
  FieldText;

/** A field for a code that is read off a letter or another screen: large, and without what corrects words. */
export function CodeField({ label, hint, error, id, ...rest }: Props) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} label={label} hint={hint} error={error}>
      <input
        {...rest}
        id={fieldId}
        type="text"
        autoCorrect="off"
        spellCheck={false}
        className={`${fieldClass} min-h-15 text-2xl tracking-[0.12em] tabular-nums`}
        aria-describedby={describedBy(fieldId, { hint, error })}
        aria-invalid={error ? true : undefined}
      />
    </Field>
  );
}
