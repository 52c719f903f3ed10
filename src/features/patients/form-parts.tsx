import type { ComponentProps, ReactNode } from 'react';
import { Controller, useFormContext } from 'react-hook-form';
import type { FieldPath } from 'react-hook-form';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { SelectField } from '#src/components/SelectField.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { TextField } from '#src/components/TextField.tsx';
import type { PatientValues } from './patient-fields.ts';
import { optionsOf } from './words.ts';

type Name = FieldPath<PatientValues>;

function useField(name: Name) {
  const { register, getFieldState, formState } = useFormContext<PatientValues>();
  return { register, error: getFieldState(name, formState).error?.message };
}

type LineProps = Omit<ComponentProps<typeof TextField>, 'name' | 'error' | 'ref'> & { name: Name };

export function FormLine({ name, ...rest }: LineProps) {
  const { register, error } = useField(name);
  return <TextField autoComplete="off" {...rest} {...register(name)} error={error} />;
}

/** A whole number; nothing typed is no number, and the schema says so. */
export function FormNumber({ name, ...rest }: LineProps) {
  const { register, error } = useField(name);
  return (
    <TextField
      autoComplete="off"
      inputMode="numeric"
      {...rest}
      {...register(name, {
        setValueAs: (typed: unknown) =>
          typeof typed === 'string' && typed.trim() !== '' ? Number(typed) : typed === '' ? undefined : typed,
      })}
      error={error}
    />
  );
}

type TextProps = Omit<ComponentProps<typeof TextArea>, 'name' | 'error' | 'ref'> & { name: Name };

export function FormText({ name, ...rest }: TextProps) {
  const { register, error } = useField(name);
  return <TextArea rows={2} dir="auto" autoComplete="off" {...rest} {...register(name)} error={error} />;
}

type ChoiceProps = { name: Name; label: string; words: Record<string, string> };

export function FormSelect({ name, label, words }: ChoiceProps) {
  const { register, error } = useField(name);
  return (
    <SelectField
      {...register(name)}
      label={label}
      options={optionsOf(words)}
      emptyLabel="Choose"
      error={error}
    />
  );
}

export function FormRadios({ name, label, words }: ChoiceProps) {
  const { control } = useFormContext<PatientValues>();
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <RadioTiles
          legend={label}
          name={name}
          options={optionsOf(words)}
          columns={2}
          value={typeof field.value === 'string' ? field.value : null}
          onChange={field.onChange}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}

/** A part of a long form under a heading of its own; two fields beside each other where there is room. */
export function FormSection({
  title,
  note,
  children,
}: {
  title: string;
  note?: string;
  children: ReactNode;
}) {
  return (
    <section>
      <SectionHeading wire>{title}</SectionHeading>
      {note ? <p className="mb-4 text-sm text-ink-soft">{note}</p> : null}
      <div className="mt-4 grid items-start gap-x-6 gap-y-5 @3xl/clinic:grid-cols-2">{children}</div>
    </section>
  );
}
