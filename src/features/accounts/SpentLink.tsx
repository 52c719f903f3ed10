import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { EntryStep } from './EntryStep.tsx';
import { TextLink } from './TextLink.tsx';

type Props = {
  title: string;
  body: string;
  /** The way to a new link. */
  again?: { to: string; label: string };
};

/** A link that opens nothing any more, and the way to another one. */
export function SpentLink({ title, body, again }: Props) {
  const { t } = useTranslation('accounts');
  return (
    <EntryStep title={title}>
      <p>{body}</p>
      {again ? (
        <>
          <LinkButton to={again.to} size="large" block>
            {again.label}
          </LinkButton>
          <div>
            <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
          </div>
        </>
      ) : (
        <LinkButton to="/sign-in" size="large" block>
          {t('toSignIn')}
        </LinkButton>
      )}
    </EntryStep>
  );
}
