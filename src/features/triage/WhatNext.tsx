import { useEffect, useRef, useState } from 'react';
import { Check, MessageSquare, MessagesSquare } from 'lucide-react';
import type { FlagCase } from '#shared/triage/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import type { DraftHandle } from '#src/lib/drafts.ts';
import { formatMoment } from '#src/lib/format.ts';
import { ReplyForm } from './ReplyForm.tsx';
import { firstNameOf } from './words.ts';

type Props = {
  flag: FlagCase;
  isMine: boolean;
  reply: DraftHandle;
  replyOpen: boolean;
  onReply: (open: boolean) => void;
  /** Null where this person may not close it. */
  onClose: (() => void) | null;
  timeZone: string;
  nowMs: number;
};

function holderWords({ claimedBy, claimedAt, state }: FlagCase, isMine: boolean, since: string): string {
  if (state === 'closed') return 'This flag is closed.';
  if (!claimedBy || !claimedAt) return 'Nobody has claimed it yet.';
  return isMine
    ? `You have had it since ${since}.`
    : `${claimedBy.name} has had it since ${since}, and closes it or gives it back.`;
}

/** The moves there are, and who has the flag. */
export function WhatNext(props: Props) {
  const { flag, isMine, reply, replyOpen, onReply, onClose, timeZone, nowMs } = props;
  const replyButton = useRef<HTMLButtonElement>(null);
  const wasOpen = useRef(replyOpen);
  useEffect(() => {
    if (wasOpen.current && !replyOpen) replyButton.current?.focus();
    wasOpen.current = replyOpen;
  }, [replyOpen]);
  const [sent, setSent] = useState(false);
  const firstName = firstNameOf(flag.patient.name);
  const since = flag.claimedAt === null ? '' : formatMoment(flag.claimedAt, nowMs, timeZone);
  return (
    <section aria-labelledby="case-next">
      <SectionHeading id="case-next" level={3} wire>
        What next
      </SectionHeading>
      <p className="text-[0.9375rem] text-ink-soft">{holderWords(flag, isMine, since)}</p>
      {/* The live region stands empty until then, or what arrives in it is not announced. */}
      <p role="status" className="text-[0.9375rem] font-bold text-leaf">
        {sent ? `Sent. ${firstName} has been told.` : null}
      </p>
      <div className="mt-3 grid gap-3">
        {replyOpen ? (
          <ReplyForm
            flag={flag}
            reply={reply}
            onSent={() => {
              setSent(true);
              onReply(false);
            }}
            onCancel={() => onReply(false)}
          />
        ) : (
          <Button
            ref={replyButton}
            block
            variant="outline"
            icon={MessageSquare}
            onClick={() => {
              setSent(false);
              onReply(true);
            }}
          >
            {reply.draft.text === '' ? `Reply to ${firstName}` : `Go on with the reply to ${firstName}`}
          </Button>
        )}
        {flag.threadId === null ? null : (
          <LinkButton block variant="outline" icon={MessagesSquare} to={`/clinic/messages/${flag.threadId}`}>
            Open the thread
          </LinkButton>
        )}
        {onClose === null ? null : (
          <Button block variant="outline" icon={Check} onClick={onClose}>
            Close with an outcome
          </Button>
        )}
      </div>
    </section>
  );
}
