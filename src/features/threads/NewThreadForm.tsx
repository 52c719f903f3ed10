import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { FieldError } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import type { z } from 'zod';
import { postThreadBody } from '#shared/threads/contract.ts';
import { useKeeper } from '#src/app/caring.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { useMe } from '#src/app/session.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { useDraft } from '#src/lib/drafts.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { OutOfHours } from './OutOfHours.tsx';
import { threadPlace } from './places.ts';
import { usePostThread } from './queries.ts';
import { useRefusal } from './refusal.ts';

type Body = z.output<typeof postThreadBody>;

/** What is wrong with a field, by the kind of rule that refused it; the server's own words for anything else. */
const wrongs: Record<string, 'missing' | 'long' | 'characters'> = {
  too_small: 'missing',
  too_big: 'long',
  custom: 'characters',
};

/** A patient's new thread with its first message. Both are kept over a reload until they are sent. */
export function NewThreadForm() {
  const { t } = useTranslation('threads');
  const { clinic } = useMe();
  const keeper = useKeeper();
  const controlsSide = useControlsSide();
  const navigate = useNavigate();
  const subject = useDraft(keeper, 'new-thread/subject');
  const text = useDraft(keeper, 'new-thread/text');
  const post = usePostThread();
  const refusal = useRefusal(post.error);
  const [defaults] = useState<Body>({
    id: subject.draft.id,
    subject: subject.draft.text,
    message: text.draft,
  });
  const { register, handleSubmit, setError, formState } = useForm<Body>({
    resolver: schemaResolver(postThreadBody),
    defaultValues: defaults,
  });
  const { errors } = formState;
  useBusyWhile(subject.draft.text !== '' || text.draft.text !== '');

  const wordsFor = (field: 'subject' | 'text', error: FieldError | undefined) => {
    if (!error) return undefined;
    const wrong = wrongs[error.type];
    return wrong ? t(`new.errors.${field}.${wrong}`) : error.message;
  };

  function submit(body: Body) {
    // The ids are those of the drafts at this moment: they change when an earlier wording has been sent.
    const sent = { ...body, id: subject.draft.id, message: { ...body.message, id: text.draft.id } };
    post.mutate(sent, {
      onSuccess: (thread) => {
        subject.clear();
        text.clear();
        void navigate(threadPlace('patient', thread.id), { replace: true });
      },
      onError: (error) => {
        if (!(error instanceof ApiProblem)) return;
        if (error.code === 'id-conflict') {
          subject.renewId();
          text.renewId();
        }
        error.fieldErrors.forEach(({ field, message }) => {
          if (field === 'subject' || field === 'message.text') setError(field, { type: 'server', message });
        });
      },
    });
  }
  const isFieldProblem = post.error instanceof ApiProblem && post.error.fieldErrors.length > 0;
  const wasChanged = post.error instanceof ApiProblem && post.error.code === 'id-conflict';

  return (
    <form noValidate className="grid gap-5" onSubmit={(event) => void handleSubmit(submit)(event)}>
      <OutOfHours clinic={clinic} />
      <TextField
        {...register('subject', {
          onChange: ({ target }: { target: HTMLInputElement }) => subject.write(target.value),
        })}
        label={t('new.subject')}
        hint={t('new.subjectHint')}
        error={wordsFor('subject', errors.subject)}
        dir="auto"
        autoComplete="off"
      />
      <TextArea
        {...register('message.text', {
          onChange: ({ target }: { target: HTMLTextAreaElement }) => text.write(target.value),
        })}
        label={t('new.text')}
        hint={t('new.textHint')}
        error={wordsFor('text', errors.message?.text)}
        rows={5}
        dir="auto"
      />
      {refusal === null || isFieldProblem || post.isPending ? null : (
        <Banner tone="warning" announce="alert">
          {wasChanged ? t('composer.changed') : t('composer.notSent', { reason: refusal })}
        </Banner>
      )}
      {/* The button stands where the free hand reaches it. */}
      <div className={controlsSide === 'left' ? 'flex justify-start' : 'flex justify-end'}>
        <Button type="submit" size="large" busy={post.isPending}>
          {t('new.send')}
        </Button>
      </div>
    </form>
  );
}
