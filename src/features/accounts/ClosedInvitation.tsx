import { Phone } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { formatDayAndDate, localDateOf, telephoneHref } from '#src/lib/format.ts';
import { EntryStep } from './EntryStep.tsx';
import { useAskAgain } from './invitation-queries.ts';
import type { InvitationKey, SeenInvitation } from './invitation-queries.ts';
import { Refusal } from './Refusal.tsx';
import { useRefusal } from './refusal.ts';

type Props = {
  invitation: InvitationKey;
  seen: SeenInvitation;
  state: Exclude<SeenInvitation['state'], 'open'>;
};

/** An invitation that opens nothing any more: why, and the ways on. */
export function ClosedInvitation({ invitation, seen, state }: Props) {
  const { t } = useTranslation('accounts');
  const ask = useAskAgain(invitation);
  const refusal = useRefusal(ask.error);
  const { phone } = seen.clinic;
  return (
    <EntryStep title={t(`invitation.${state}.title`)} detail={seen.clinic.name}>
      <p>{t(`invitation.${state}.body`, { date: formatDayAndDate(localDateOf(seen.expiresAt)) })}</p>
      <Refusal text={refusal} />
      <div role="status" className="empty:hidden">
        {ask.isSuccess ? <Banner>{t('invitation.asked')}</Banner> : null}
      </div>
      <div className="grid gap-3">
        {state === 'used' ? (
          <LinkButton to="/sign-in" size="large" block>
            {t('signIn')}
          </LinkButton>
        ) : null}
        {ask.isSuccess ? null : (
          <Button
            size="large"
            block
            variant={state === 'used' ? 'outline' : 'primary'}
            busy={ask.isPending}
            onClick={() => ask.mutate()}
          >
            {t('invitation.askAgain')}
          </Button>
        )}
        <LinkButton href={telephoneHref(phone)} variant="outline" block icon={Phone}>
          {t('callClinic', { number: phone })}
        </LinkButton>
      </div>
    </EntryStep>
  );
}
