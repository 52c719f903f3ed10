import { Phone } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { telephoneHref } from '#src/lib/format.ts';
import { EntryStep } from './EntryStep.tsx';
import { useSignInPage } from './queries.ts';
import { TextLink } from './TextLink.tsx';

type Props = {
  /** `unknown`: nobody knows this secret. `noSecret`: the page was opened without one. */
  why: 'unknown' | 'noSecret';
};

/** There is no invitation to show, and the ways on that there are all the same. */
export function LostInvitation({ why }: Props) {
  const { t } = useTranslation('accounts');
  const phone = useSignInPage().data?.clinic?.phone;
  return (
    <EntryStep title={t(`invitation.${why}.title`)}>
      <p>{t(`invitation.${why}.body`)}</p>
      <div className="grid gap-3">
        <LinkButton to="/start" size="large" block>
          {t('haveLetter')}
        </LinkButton>
        {phone ? (
          <LinkButton href={telephoneHref(phone)} variant="outline" block icon={Phone}>
            {t('callClinic', { number: phone })}
          </LinkButton>
        ) : null}
      </div>
      <div>
        <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
      </div>
    </EntryStep>
  );
}
