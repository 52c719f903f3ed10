import { MessagesSquare } from 'lucide-react';
import { useParams } from 'react-router-dom';
import { usePageHeading } from '#src/app/page-heading.ts';
import { classNames } from '#src/components/class-names.ts';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { TwoPanes } from '#src/features/clinic/TwoPanes.tsx';
import { ThreadList } from '#src/features/threads/ThreadList.tsx';
import { ThreadView } from '#src/features/threads/ThreadView.tsx';
import { WaitingLine } from '#src/features/threads/WaitingLine.tsx';

/** The threads that one answers for on the left, the open one on the right. */
export function ClinicMessagesPage() {
  const threadId = useParams().threadId ?? null;
  const heading = usePageHeading('Messages');
  return (
    <TwoPanes
      openKey={threadId}
      listHead={
        <div className={classNames('px-5 pt-5 pb-4', threadId !== null && '@max-4xl/clinic:sr-only')}>
          <h1 ref={heading} tabIndex={-1} className="text-2xl leading-tight">
            Messages
          </h1>
          <WaitingLine />
        </div>
      }
      list={<ThreadList side="clinic" selectedId={threadId} />}
      detail={
        threadId === null ? (
          <EmptyState icon={MessagesSquare} title="No thread is open.">
            Choose one from the list. Those that wait on us stand first.
          </EmptyState>
        ) : (
          <ThreadView threadId={threadId} side="clinic" />
        )
      }
    />
  );
}
