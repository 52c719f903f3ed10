import { useId } from 'react';
import type { ComponentProps } from 'react';
import { Field, describedBy, fieldClass } from './Field.tsx';
import type { FieldText } from './Field.tsx';

type Option = { value: string; label: string };

type Props = Omit<ComponentProps<'select'>, 'className' | 'children' | 'aria-describedby' | 'aria-invalid'> &
  FieldText & {
    options: readonly Option[];
    /** Stands there until something is chosen, so that nothing is chosen by nobody. */
    emptyLabel?: string;
  };

/** One of a few, in the browser's own list. */
export function SelectField({ label, hint, error, id, options, emptyLabel, ...rest }: Props) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} label={label} hint={hint} error={error}>
      <select
        {...rest}
        id={fieldId}
        className={fieldClass}
        aria-describedby={describedBy(fieldId, { hint, error })}
        aria-invalid={error ? true : undefined}
      >
        {emptyLabel === undefined ? null : <option value="">{emptyLabel}</option>}
        {options.map(({ value, label: words }) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </select>
    </Field>
  );
}
