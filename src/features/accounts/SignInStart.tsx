import { useEffect, useState } from 'react';
import { Trans, useTranslation } from 'react-i18next';
import type { SignInStep } from '#shared/accounts/contract.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { passkeysSupported, preloadPasskeys } from '#src/lib/passkeys.ts';
import { remembers } from './device-memory.ts';
import { EntryStep } from './EntryStep.tsx';
import { OrLine } from './OrLine.tsx';
import { PasskeySignIn } from './PasskeySignIn.tsx';
import { useSignInPage } from './queries.ts';
import { SignInForm } from './SignInForm.tsx';
import { TextLink } from './TextLink.tsx';

type Props = {
  /** Why nobody is signed in any more, or what was just done. */
  notice: string | null;
  onStep: (step: SignInStep) => void;
};

/** The ways in: the passkey first where this browser has used one, the form first elsewhere. */
export function SignInStart({ notice, onStep }: Props) {
  const { t } = useTranslation('accounts');
  const page = useSignInPage().data;
  const [stay, setStay] = useState(() => remembers('own-phone'));
  const supported = passkeysSupported();
  const passkeyFirst = supported && remembers('passkey-used');
  useEffect(preloadPasskeys, []);
  const stayBox = (
    <div>
      <Checkbox
        checked={stay}
        onChange={({ target }) => setStay(target.checked)}
        label={t('stay')}
        aria-describedby="stay-help"
      />
      <p id="stay-help" className="pl-9 text-sm text-ink-soft">
        {t('stayHelp')}
      </p>
    </div>
  );
  return (
    <EntryStep title={t('title')} detail={page?.clinic?.name}>
      {notice ? <Banner announce="status">{notice}</Banner> : null}
      {passkeyFirst ? (
        <>
          {stayBox}
          <PasskeySignIn staySignedIn={stay} first />
          <OrLine />
        </>
      ) : null}
      <SignInForm staySignedIn={stay} second={passkeyFirst} onStep={onStep}>
        {passkeyFirst ? null : stayBox}
      </SignInForm>
      {supported && !passkeyFirst ? (
        <>
          <OrLine />
          <PasskeySignIn staySignedIn={stay} first={false} />
        </>
      ) : null}
      <div className="flex flex-wrap gap-x-6">
        <TextLink to="/forgot-password">{t('forgot')}</TextLink>
        <TextLink to="/start">{t('haveLetter')}</TextLink>
      </div>
      {page?.demo ? (
        <p className="text-sm text-ink-soft">
          <Trans
            t={t}
            i18nKey="demo"
            components={{
              outbox: (
                // The words come from the translation; the link must not be empty for the linter's eyes.
                <a href="/outbox" className="underline underline-offset-4">
                  outbox
                </a>
              ),
            }}
          />
        </p>
      ) : null}
    </EntryStep>
  );
}
