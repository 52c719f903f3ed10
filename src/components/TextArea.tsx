import { useId } from 'react';
import type { ComponentProps } from 'react';
import { Field, describedBy, fieldClass } from './Field.tsx';
import type { FieldText } from './Field.tsx';

type Props = Omit<ComponentProps<'textarea'>, 'className' | 'aria-describedby' | 'aria-invalid'> & FieldText;

/** A field of several lines that grows with what is typed, where the browser knows how. */
export function TextArea({ label, hint, error, id, rows = 3, ...rest }: Props) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} label={label} hint={hint} error={error}>
      <textarea
        {...rest}
        id={fieldId}
        rows={rows}
        // A field that fits its content does not heed `rows`; the rest is its padding and border.
        style={{ minHeight: `calc(${rows} * 1lh + 1.375rem)` }}
        className={`${fieldClass} field-sizing-content max-h-[60vh] resize-y`}
        aria-describedby={describedBy(fieldId, { hint, error })}
        aria-invalid={error ? true : undefined}
      />
    </Field>
  );
}
