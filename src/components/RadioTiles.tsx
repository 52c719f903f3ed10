import { useId } from 'react';
import { classNames } from './class-names.ts';

type RadioOption<Value extends string> = { value: Value; label: string; detail?: string };

type Props<Value extends string> = {
  legend: string;
  name?: string;
  options: RadioOption<Value>[];
  /** Two beside each other, where the screen is wide enough for it. */
  columns?: 1 | 2;
  value: Value | null;
  onChange: (value: Value) => void;
  error?: string;
};

/** A choice inside a form: arrow keys move it, and it is sent with the rest. */
export function RadioTiles<Value extends string>({
  legend,
  name,
  options,
  columns = 1,
  value,
  onChange,
  error,
}: Props<Value>) {
  const ownName = useId();
  const errorId = useId();
  return (
    <fieldset className="min-w-0" aria-describedby={error ? errorId : undefined}>
      <legend className="mb-2 font-bold">{legend}</legend>
      <div className={classNames('grid gap-2', columns === 2 && 'sm:grid-cols-2')}>
        {options.map((option) => (
          <label
            key={option.value}
            className="flex min-h-target items-center gap-3 rounded border border-wire-strong bg-sheet px-3.5 py-2 leading-snug hover:bg-leaf-wash has-checked:border-leaf has-checked:bg-leaf-wash has-checked:ring-1 has-checked:ring-leaf has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-focus"
          >
            <input
              type="radio"
              name={name ?? ownName}
              value={option.value}
              checked={option.value === value}
              onChange={() => onChange(option.value)}
              className="size-5 shrink-0 accent-leaf focus-visible:outline-none"
            />
            <span className="min-w-0">
              <span className="block">{option.label}</span>
              {option.detail ? <span className="block text-sm text-ink-soft">{option.detail}</span> : null}
            </span>
          </label>
        ))}
      </div>
      {error ? (
        <p id={errorId} className="mt-1.5 text-sm font-bold text-clay">
          {error}
        </p>
      ) : null}
    </fieldset>
  );
}
