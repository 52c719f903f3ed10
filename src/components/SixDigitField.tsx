import type { Ref } from 'react';
import { CodeField } from './CodeField.tsx';
import type { FieldText } from './Field.tsx';

const digits = 6;

type Props = FieldText & {
  value: string;
  onChange: (code: string) => void;
  /** The sixth digit was typed or pasted: nobody has to find a button after it. */
  onComplete: (code: string) => void;
  ref?: Ref<HTMLInputElement>;
};

/** A code of six digits, which phones offer to fill in. Spaces and anything else but digits are left out. */
export function SixDigitField({ value, onChange, onComplete, ...rest }: Props) {
  return (
    <CodeField
      {...rest}
      value={value}
      inputMode="numeric"
      autoComplete="one-time-code"
      onChange={({ target }) => {
        const code = target.value.replace(/\D/g, '').slice(0, digits);
        onChange(code);
        if (code.length === digits && code !== value) onComplete(code);
      }}
    />
  );
}
