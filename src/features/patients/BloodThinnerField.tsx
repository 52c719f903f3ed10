import { useState } from 'react';
import { useController, useFormContext } from 'react-hook-form';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { TextField } from '#src/components/TextField.tsx';
import type { PatientValues } from './patient-fields.ts';

type Choice = 'none' | 'which' | 'not-asked';

const options: { value: Choice; label: string; detail?: string }[] = [
  { value: 'none', label: 'None', detail: 'Asked, and none is taken.' },
  { value: 'which', label: 'Takes one' },
  { value: 'not-asked', label: 'Not asked', detail: 'Counts as taking one until somebody asks.' },
];

function choiceOf(value: string | null | undefined): Choice | null {
  if (value === null) return 'not-asked';
  if (value === undefined || value === '') return null;
  return value === 'none' ? 'none' : 'which';
}

/** "None" and "nobody has asked" are two answers: after a blow to the head the second one is an emergency. */
export function BloodThinnerField() {
  const { control } = useFormContext<PatientValues>();
  const { field, fieldState } = useController({ control, name: 'identity.bloodThinner' });
  const [choice, setChoice] = useState(() => choiceOf(field.value));
  const [name, setName] = useState(() => (choice === 'which' ? (field.value ?? '') : ''));
  const message = fieldState.error?.message;
  const nameMissing = choice === 'which' && name.trim() === '' && message !== undefined;

  function choose(next: Choice) {
    setChoice(next);
    field.onChange(next === 'none' ? 'none' : next === 'not-asked' ? null : name);
  }
  return (
    <div className="grid gap-3">
      <RadioTiles
        legend="Blood thinner"
        name={field.name}
        options={options}
        value={choice}
        onChange={choose}
        error={choice === 'which' ? undefined : message}
      />
      {choice === 'which' ? (
        <TextField
          label="Which blood thinner?"
          value={name}
          onChange={({ target }) => {
            setName(target.value);
            field.onChange(target.value);
          }}
          onBlur={field.onBlur}
          error={nameMissing ? 'Enter its name.' : message}
          autoComplete="off"
        />
      ) : null}
    </div>
  );
}
