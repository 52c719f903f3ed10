import { useId } from 'react';
import type { ComponentProps } from 'react';
import { Field, describedBy, fieldClass } from './Field.tsx';
import type { FieldText } from './Field.tsx';

type Props = Omit<ComponentProps<'input'>, 'className' | 'aria-describedby' | 'aria-invalid'> & FieldText;

export function TextField({ label, hint, error, id, type = 'text', ...rest }: Props) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} label={label} hint={hint} error={error}>
      <input
        {...rest}
        id={fieldId}
        type={type}
        className={fieldClass}
        aria-describedby={describedBy(fieldId, { hint, error })}
        aria-invalid={error ? true : undefined}
      />
    </Field>
  );
}
