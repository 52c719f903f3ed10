import { ArrowLeft, Printer, Smartphone } from 'lucide-react';
import { useLocation, useNavigate, useParams } from 'react-router-dom';
import { useDocumentTitle } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { keptIn } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { KeptNotice } from '#src/features/clinic/KeptNotice.tsx';
import { Letter } from '#src/features/people/Letter.tsx';
import { PhoneSetUp } from '#src/features/people/PhoneSetUp.tsx';
import { useInvitationLetter } from '#src/features/people/queries.ts';
import { useNowMs } from '#src/lib/now.ts';
import { mayPassLater } from '#src/lib/problem.ts';
import { refusalOf } from '#src/lib/refusal.ts';

/** The letter of an invitation, to print. */
export const InvitationLetterPage = () => <InvitationOnScreen as="letter" />;

/** The same invitation as one large code, for the person's own phone. */
export const InvitationPhonePage = () => <InvitationOnScreen as="phone" />;

/** Without the clinic's rail: somebody who is not of the clinic looks at this screen. */
function InvitationOnScreen({ as }: { as: 'letter' | 'phone' }) {
  const { invitationId = '' } = useParams();
  const { timeZone } = useMe().clinic;
  const nowMs = useNowMs();
  const navigate = useNavigate();
  const kept = keptIn(useLocation().state);
  useDocumentTitle('Invitation');
  const { data, error, isFetching, refetch } = useInvitationLetter(invitationId);
  const place = `/letters/${invitationId}`;
  return (
    <main className="mx-auto grid max-w-4xl gap-6 px-5 py-5 print:max-w-none print:p-0">
      <div className="flex flex-wrap items-center justify-between gap-3 print:hidden">
        <Button variant="quiet" icon={ArrowLeft} onClick={() => void navigate(-1)}>
          Back
        </Button>
        {data ? (
          <div className="flex flex-wrap gap-3">
            {as === 'letter' ? (
              <>
                <LinkButton to={`${place}/phone`} variant="outline" icon={Smartphone}>
                  Set up on their phone here
                </LinkButton>
                <Button icon={Printer} onClick={() => window.print()}>
                  Print
                </Button>
              </>
            ) : (
              <LinkButton to={place} variant="outline" icon={Printer}>
                Letter
              </LinkButton>
            )}
          </div>
        ) : null}
      </div>
      <div className="print:hidden">
        <KeptNotice text={kept} />
      </div>
      {data ? (
        as === 'letter' ? (
          <Letter letter={data} timeZone={timeZone} />
        ) : (
          <PhoneSetUp letter={data} nowMs={nowMs} timeZone={timeZone} />
        )
      ) : error ? (
        <ErrorState
          title="This invitation cannot be shown."
          retry={
            mayPassLater(error)
              ? { label: 'Try again', onRetry: () => void refetch(), busy: isFetching }
              : undefined
          }
        >
          {refusalOf(error).title}
        </ErrorState>
      ) : (
        <LoadingState label="The letter is loading" lines={8} />
      )}
    </main>
  );
}
