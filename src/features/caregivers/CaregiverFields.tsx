import { useController, useFormContext } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { CheckTile } from '#src/components/CheckTile.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { TextField } from '#src/components/TextField.tsx';

/** What is asked of every caregiver. How long is chosen first, and the day only where one is wanted. */
export type Limits = {
  relationship: string;
  mayCheckIn: boolean;
  mayMessage: boolean;
  /** Empty until somebody has chosen: nothing is preselected. */
  howLong: '' | 'open' | 'until';
  until: string;
};

/** Who it is to the patient, what they may do, and until when. */
export function CaregiverFields() {
  const { t } = useTranslation('caregivers');
  const { control } = useFormContext<Limits>();
  const relationship = useController({ control, name: 'relationship' });
  const mayCheckIn = useController({ control, name: 'mayCheckIn' });
  const mayMessage = useController({ control, name: 'mayMessage' });
  const howLong = useController({ control, name: 'howLong' });
  const until = useController({ control, name: 'until' });
  return (
    <>
      <TextField
        {...relationship.field}
        label={t('form.relationship')}
        hint={t('form.relationshipHint')}
        error={relationship.fieldState.error?.message}
        autoComplete="off"
        dir="auto"
      />
      <fieldset className="grid min-w-0 gap-2">
        <legend className="font-bold">{t('form.may')}</legend>
        <p className="text-sm text-ink-soft">{t('form.mayHint')}</p>
        {[
          { ...mayCheckIn.field, label: t('form.mayCheckIn') },
          { ...mayMessage.field, label: t('form.mayMessage') },
        ].map(({ value, onChange, label, ...field }) => (
          <CheckTile
            key={field.name}
            {...field}
            label={label}
            checked={value}
            onChange={(event) => onChange(event.target.checked)}
          />
        ))}
      </fieldset>
      <RadioTiles
        legend={t('form.howLong')}
        value={howLong.field.value === '' ? null : howLong.field.value}
        onChange={howLong.field.onChange}
        error={howLong.fieldState.error?.message}
        options={[
          { value: 'open', label: t('form.openEnded'), detail: t('form.openEndedHint') },
          { value: 'until', label: t('form.untilDate') },
        ]}
      />
      {howLong.field.value === 'until' ? (
        <TextField
          {...until.field}
          type="date"
          label={t('form.lastDay')}
          error={until.fieldState.error?.message}
        />
      ) : null}
    </>
  );
}
