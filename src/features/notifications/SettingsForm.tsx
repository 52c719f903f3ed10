import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { z } from 'zod';
import { changeNotificationSettingsBody } from '#shared/notifications/contract.ts';
import type { NotificationSettings } from '#shared/notifications/contract.ts';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { ChannelChoices } from './ChannelChoices.tsx';
import { useChangeSettings } from './queries.ts';
import { timeZoneNames } from './time-zones.ts';

const { phone, timeZone, quietFrom, quietUntil, remindAt } = changeNotificationSettingsBody.shape;

/** An empty field is none. */
const orNone = <Field extends z.ZodType>(field: Field) =>
  z.preprocess((typed) => (typed === '' ? null : typed), field) as unknown as z.ZodType<string, string>;

const schema = z
  .object({
    phone: orNone(phone),
    timeZone,
    quietFrom: orNone(quietFrom),
    quietUntil: orNone(quietUntil),
    remindAt: orNone(remindAt),
  })
  .refine((times) => !times.quietFrom === !times.quietUntil, {
    path: ['quietUntil'],
    message: 'Give both times, or neither.',
    when: () => true,
  })
  .refine((times) => !times.quietFrom || times.quietFrom !== times.quietUntil, {
    path: ['quietUntil'],
    message: 'Give two different times, or neither.',
    when: () => true,
  });

type Values = Record<'phone' | 'timeZone' | 'quietFrom' | 'quietUntil' | 'remindAt', string>;

const orNull = (text: string | null): string | null => (text ? text : null);

type Props = { settings: NotificationSettings; isPatient: boolean };

/** Kinds, ways, quiet hours, number and reminder; saved together, so that they fit each other. */
export function SettingsForm({ settings, isPatient }: Props) {
  const { t } = useTranslation('notifications');
  const change = useChangeSettings();
  const [choices, setChoices] = useState(settings.choices);
  const { register, handleSubmit, setError, reset, control, formState } = useForm<Values>({
    resolver: schemaResolver(schema),
    defaultValues: valuesOf(settings),
  });
  const hasPhone = useWatch({ control, name: 'phone' }).trim() !== '';
  const { errors } = formState;
  const turned = choices.some(({ enabled }, index) => enabled !== settings.choices[index]?.enabled);
  const changed = formState.isDirty || turned;
  useBusyWhile(changed);
  const submit = handleSubmit((values) =>
    change.mutate(
      {
        choices: choices.map(({ kind, channel, enabled }) => ({ kind, channel, enabled })),
        phone: orNull(values.phone),
        timeZone: values.timeZone,
        quietFrom: orNull(values.quietFrom),
        quietUntil: orNull(values.quietUntil),
        remindAt: isPatient ? orNull(values.remindAt) : settings.remindAt,
      },
      {
        onSuccess: (kept) => {
          setChoices(kept.choices);
          reset(valuesOf(kept));
        },
        onError: (error) => showFieldErrors(error, setError),
      },
    ),
  );
  return (
    <form
      noValidate
      className="grid grid-cols-[minmax(0,1fr)] gap-8"
      onSubmit={(event) => void submit(event)}
    >
      {/* An administrator is told of nothing that they could turn off. */}
      {choices.length > 0 ? (
        <section aria-labelledby="choices" className="grid grid-cols-[minmax(0,1fr)] gap-5">
          <SectionHeading id="choices" wire>
            {t('choices.title')}
          </SectionHeading>
          <ChannelChoices choices={choices} hasPhone={hasPhone} onChange={setChoices} />
        </section>
      ) : null}
      <section aria-labelledby="phone" className="grid gap-2">
        <SectionHeading id="phone" wire>
          {t('phone.title')}
        </SectionHeading>
        <TextField
          {...register('phone')}
          type="tel"
          autoComplete="tel"
          label={t('phone.label')}
          hint={t('phone.hint')}
          error={errors.phone?.message}
        />
      </section>
      <section aria-labelledby="quiet" className="grid gap-4">
        <SectionHeading id="quiet" wire>
          {t('quiet.title')}
        </SectionHeading>
        <p className="text-ink-soft">{t(isPatient ? 'quiet.detail' : 'quiet.detailStaff')}</p>
        <div className="grid gap-4 sm:grid-cols-2">
          <TextField
            {...register('quietFrom')}
            type="time"
            label={t('quiet.from')}
            error={errors.quietFrom?.message}
          />
          <TextField
            {...register('quietUntil')}
            type="time"
            label={t('quiet.until')}
            error={errors.quietUntil?.message}
          />
        </div>
        <TextField
          {...register('timeZone')}
          label={t('zone.label')}
          hint={t('zone.hint')}
          error={errors.timeZone?.message}
          list="time-zones"
          autoComplete="off"
          spellCheck={false}
        />
        <datalist id="time-zones">
          {timeZoneNames().map((name) => (
            <option key={name} value={name} />
          ))}
        </datalist>
      </section>
      {isPatient ? (
        <section aria-labelledby="reminder" className="grid gap-2">
          <SectionHeading id="reminder" wire>
            {t('reminder.title')}
          </SectionHeading>
          <TextField
            {...register('remindAt')}
            type="time"
            label={t('reminder.label')}
            hint={t('reminder.hint')}
            error={errors.remindAt?.message}
          />
        </section>
      ) : null}
      <div className="grid justify-items-start gap-3">
        {change.isPending ? null : <AccountRefused error={change.error} />}
        <div role="status" className="empty:hidden">
          {change.isSuccess && !changed ? <Banner>{t('saved')}</Banner> : null}
        </div>
        <Button type="submit" size="large" busy={change.isPending}>
          {t('save')}
        </Button>
      </div>
    </form>
  );
}

const valuesOf = (settings: NotificationSettings): Values => ({
  phone: settings.phone ?? '',
  timeZone: settings.timeZone,
  quietFrom: settings.quietFrom ?? '',
  quietUntil: settings.quietUntil ?? '',
  remindAt: settings.remindAt ?? '',
});
