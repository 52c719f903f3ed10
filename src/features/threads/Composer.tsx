import { useEffect, useEffectEvent, useId } from 'react';
import { useTranslation } from 'react-i18next';
import type { Message } from '#shared/threads/contract.ts';
import { useKeeper } from '#src/app/caring.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { useDraft } from '#src/lib/drafts.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { deliveryOf } from './draft-delivery.ts';
import { usePostMessage } from './queries.ts';
import { useRefusal } from './refusal.ts';

type Props = { threadId: string; label: string; messages: readonly Message[]; onSent: () => void };

/** Where a message is written. What was typed stays until the thread has it, and a repeat is the same message. */
export function Composer({ threadId, label, messages, onSent }: Props) {
  const { t } = useTranslation('threads');
  const controlsSide = useControlsSide();
  const { draft, write, renewId, clear } = useDraft(useKeeper(), `thread/${threadId}`);
  const post = usePostMessage(threadId);
  const refusal = useRefusal(post.error);
  const id = useId();
  useBusyWhile(draft.text !== '');

  const delivery = deliveryOf(draft, messages);
  const settle = useEffectEvent(() => {
    if (delivery === 'there') {
      clear();
      post.reset();
      onSent();
    }
    if (delivery === 'changed') renewId();
  });
  // The answer may be lost though the message arrived: then it turns up in the thread under the draft's id.
  useEffect(() => settle(), [delivery]);

  const wasChanged = post.error instanceof ApiProblem && post.error.code === 'id-conflict';
  function submit() {
    post.mutate(draft, {
      onSuccess: () => {
        clear();
        onSent();
      },
      onError: (error) => {
        if (error instanceof ApiProblem && error.code === 'id-conflict') renewId();
      },
    });
  }

  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        if (draft.text.trim() !== '') submit();
      }}
    >
      <TextArea
        id={id}
        label={label}
        rows={2}
        dir="auto"
        maxLength={8000}
        value={draft.text}
        // What is on its way is one text; a word added meanwhile would belong to no message.
        readOnly={post.isPending}
        onChange={(event) => write(event.target.value)}
      />
      {refusal === null || post.isPending ? null : (
        <Banner tone="warning" announce="alert">
          {wasChanged ? t('composer.changed') : t('composer.notSent', { reason: refusal })}
        </Banner>
      )}
      {/* The button stands where the free hand reaches it. */}
      <div className={controlsSide === 'left' ? 'flex justify-start' : 'flex justify-end'}>
        <Button type="submit" busy={post.isPending} disabled={draft.text.trim() === ''}>
          {post.isError ? t('composer.again') : t('composer.send')}
        </Button>
      </div>
    </form>
  );
}
