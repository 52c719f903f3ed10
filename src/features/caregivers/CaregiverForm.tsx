import { useEffect, useRef, useState } from 'react';
import type { FormEvent, ReactNode } from 'react';
import { FormProvider, useController, useForm } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { z } from 'zod';
import { inviteCaregiverBody } from '#shared/caregivers/contract.ts';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { Button } from '#src/components/Button.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { CaregiverFields } from './CaregiverFields.tsx';
import type { Limits } from './CaregiverFields.tsx';
import { useChangeCaregiver, useInviteCaregiver } from './queries.ts';

/** The route's own fields, with the question for how long before the day itself. */
const howLongField = z
  .enum(['', 'open', 'until'])
  .refine((howLong) => howLong !== '', 'Choose one of the two.');
const { name, email, relationship, mayCheckIn, mayMessage } = inviteCaregiverBody.shape;
const limits = { relationship, mayCheckIn, mayMessage, howLong: howLongField, until: z.string() };

const hasDay = ({ howLong, until }: Pick<Limits, 'howLong' | 'until'>) =>
  howLong !== 'until' || z.iso.date().safeParse(until).success;
// Asked for together with the other fields: nobody should correct a form twice.
const lastDay = { path: ['until'], message: 'Enter the last day.', when: () => true };

const limitsSchema = z.object(limits).refine(hasDay, lastDay);
const inviteSchema = z.object({ name, email, ...limits }).refine(hasDay, lastDay);

type Invitation = Limits & { name: string; email: string };

const bodyOf = ({ relationship, mayCheckIn, mayMessage, howLong, until }: Limits) => ({
  relationship,
  mayCheckIn,
  mayMessage,
  until: howLong === 'until' ? until : null,
});

const empty: Invitation = {
  name: '',
  email: '',
  relationship: '',
  mayCheckIn: false,
  mayMessage: false,
  howLong: '',
  until: '',
};

type Props = { onDone: (sentence: string) => void; onCancel: () => void };

/** Invites somebody. Nothing is chosen for the patient beforehand. */
export function InviteForm({ onDone, onCancel }: Props) {
  const { t } = useTranslation('caregivers');
  const invite = useInviteCaregiver();
  // One id for as long as the form is open: sending it twice invites once.
  const [id] = useState(() => crypto.randomUUID());
  const form = useForm<Invitation>({ resolver: schemaResolver(inviteSchema), defaultValues: empty });
  const submit = form.handleSubmit((values) => {
    const { name, email } = values;
    invite.mutate(
      { id, name, email, ...bodyOf(values) },
      {
        onSuccess: () => onDone(t('form.sent', { name })),
        onError: (error) => showFieldErrors(error, form.setError),
      },
    );
  });
  return (
    <FormProvider {...form}>
      <Frame
        title={t('form.inviteTitle')}
        detail={t('form.inviteDetail')}
        send={t('form.send')}
        busy={invite.isPending}
        error={invite.error}
        dirty={form.formState.isDirty}
        onSubmit={submit}
        onCancel={onCancel}
      >
        <WhoFields />
        <CaregiverFields />
      </Frame>
    </FormProvider>
  );
}

function WhoFields() {
  const { t } = useTranslation('caregivers');
  const name = useController<Invitation, 'name'>({ name: 'name' });
  const email = useController<Invitation, 'email'>({ name: 'email' });
  return (
    <>
      <TextField
        {...name.field}
        label={t('form.name')}
        error={name.fieldState.error?.message}
        autoComplete="off"
        dir="auto"
      />
      <TextField
        {...email.field}
        type="email"
        label={t('form.email')}
        error={email.fieldState.error?.message}
        autoComplete="off"
        autoCapitalize="none"
        spellCheck={false}
      />
    </>
  );
}

/** Changes what somebody who was let in may do. */
export function ChangeForm({ card, onDone, onCancel }: Props & { card: CaregiverCard }) {
  const { t } = useTranslation('caregivers');
  const change = useChangeCaregiver();
  const { relationship, mayCheckIn, mayMessage, until } = card;
  const form = useForm<Limits>({
    resolver: schemaResolver(limitsSchema),
    defaultValues: {
      relationship,
      mayCheckIn,
      mayMessage,
      howLong: until === null ? 'open' : 'until',
      until: until ?? '',
    },
  });
  const submit = form.handleSubmit((values) =>
    change.mutate(
      { caregiverId: card.id, body: bodyOf(values) },
      {
        onSuccess: () => onDone(t('form.saved')),
        onError: (error) => showFieldErrors(error, form.setError),
      },
    ),
  );
  return (
    <FormProvider {...form}>
      <Frame
        title={t('form.changeTitle', { name: card.name })}
        send={t('form.save')}
        busy={change.isPending}
        error={change.error}
        dirty={form.formState.isDirty}
        onSubmit={submit}
        onCancel={onCancel}
      >
        <CaregiverFields />
      </Frame>
    </FormProvider>
  );
}

type FrameProps = {
  title: string;
  detail?: string;
  send: string;
  busy: boolean;
  error: Error | null;
  dirty: boolean;
  onSubmit: (event: FormEvent) => Promise<void>;
  onCancel: () => void;
  children: ReactNode;
};

function Frame({ title, detail, send, busy, error, dirty, onSubmit, onCancel, children }: FrameProps) {
  const { t } = useTranslation('app');
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus(), []);
  useBusyWhile(dirty);
  return (
    <form
      noValidate
      className="grid grid-cols-[minmax(0,1fr)] gap-5"
      onSubmit={(event) => void onSubmit(event)}
    >
      <div>
        <h2 ref={heading} tabIndex={-1} className="text-lg leading-snug">
          {title}
        </h2>
        {detail ? <p className="text-ink-soft">{detail}</p> : null}
      </div>
      {children}
      {busy ? null : <AccountRefused error={error} />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" size="large" busy={busy}>
          {send}
        </Button>
        <Button variant="outline" size="large" onClick={onCancel}>
          {t('cancel')}
        </Button>
      </div>
    </form>
  );
}
