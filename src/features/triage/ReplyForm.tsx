import { useEffect, useId, useRef } from 'react';
import type { FlagCase } from '#shared/triage/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import type { DraftHandle } from '#src/lib/drafts.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { useReplyToFlag } from './queries.ts';
import { RefusalBanner } from './RefusalBanner.tsx';
import { firstNameOf } from './words.ts';

type Props = {
  flag: FlagCase;
  /** The text under the id that it is sent with; it outlives this form. */
  reply: DraftHandle;
  onSent: () => void;
  onCancel: () => void;
};

/** Writes to the patient about this flag. What was typed stays until the server has it. */
export function ReplyForm({ flag, reply, onSent, onCancel }: Props) {
  const { draft } = reply;
  const send = useReplyToFlag(flag.id);
  const id = useId();
  const field = useRef<HTMLTextAreaElement>(null);
  useEffect(() => field.current?.focus(), []);
  useBusyWhile(draft.text !== '');
  const firstName = firstNameOf(flag.patient.name);
  const notAccepted =
    send.error instanceof ApiProblem
      ? send.error.fieldErrors.find((error) => error.field === 'text')?.message
      : undefined;

  function submit() {
    send.mutate(draft, {
      onSuccess: () => {
        reply.clear();
        onSent();
      },
      onError: (error) => {
        // An earlier wording has arrived under this id: what stands here now is a message of its own.
        if (error instanceof ApiProblem && error.code === 'id-conflict') reply.renewId();
      },
    });
  }

  return (
    <form
      aria-label={`Reply to ${firstName}`}
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      <TextArea
        ref={field}
        id={id}
        label={`Reply to ${firstName}`}
        hint={
          flag.state === 'open'
            ? `${firstName} is told at once, and that it is you. Sending it claims the flag for you.`
            : `${firstName} is told at once, and that it is you.`
        }
        error={notAccepted}
        rows={5}
        dir="auto"
        maxLength={8000}
        value={draft.text}
        onChange={(event) => reply.write(event.target.value)}
      />
      {notAccepted ? null : <RefusalBanner error={send.error} kept="Your text is kept here." />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" busy={send.isPending} disabled={draft.text.trim() === ''}>
          Send
        </Button>
        <Button variant="outline" onClick={onCancel}>
          {draft.text === '' ? 'Cancel' : 'Keep as a draft'}
        </Button>
      </div>
    </form>
  );
}
