import { Eye, EyeOff } from 'lucide-react';
import { useId, useState } from 'react';
import type { ComponentProps } from 'react';
import { Field, describedBy, fieldClass } from './Field.tsx';
import type { FieldText } from './Field.tsx';

type Props = Omit<ComponentProps<'input'>, 'className' | 'type' | 'aria-describedby' | 'aria-invalid'> &
  FieldText & {
    /** The name of the button that shows what was typed; its pressed state says whether it is shown. */
    revealLabel: string;
  };

export function PasswordField({ label, hint, error, id, revealLabel, ...rest }: Props) {
  const [shown, setShown] = useState(false);
  const ownId = useId();
  const fieldId = id ?? ownId;
  const Icon = shown ? EyeOff : Eye;
  return (
    <Field id={fieldId} label={label} hint={hint} error={error}>
      <div className="relative">
        <input
          {...rest}
          id={fieldId}
          type={shown ? 'text' : 'password'}
          autoCapitalize="none"
          spellCheck={false}
          className={`${fieldClass} pr-14`}
          aria-describedby={describedBy(fieldId, { hint, error })}
          aria-invalid={error ? true : undefined}
        />
        <button
          type="button"
          aria-pressed={shown}
          aria-label={revealLabel}
          title={revealLabel}
          onClick={() => setShown(!shown)}
          className="absolute inset-y-0 right-0 grid w-target place-items-center rounded text-ink -outline-offset-3"
        >
          <Icon className="size-5" aria-hidden />
        </button>
      </div>
    </Field>
  );
}
