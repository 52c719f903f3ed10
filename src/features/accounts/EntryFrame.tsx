import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Mark } from '#src/components/Mark.tsx';
import { telephoneHref } from '#src/lib/format.ts';
import { useSignInPage } from './queries.ts';
import { SignInTree } from './SignInTree.tsx';

/** Around every page before the sign-in: the mark, the emergency line, and the tree where there is room. */
export function EntryFrame({ children }: { children: ReactNode }) {
  const { t } = useTranslation('accounts');
  const clinic = useSignInPage().data?.clinic ?? null;
  return (
    <div className="base-large grid min-h-dvh lg:grid-cols-2">
      <main className="grid min-w-0 content-center px-5 py-8 sm:px-10">
        <div className="mx-auto grid w-full max-w-[25rem] min-w-0 gap-8 lg:gap-12">
          <Mark />
          {children}
          <p className="text-sm text-ink-soft">
            {clinic ? (
              <a href={telephoneHref(clinic.emergencyNumber)} className="underline underline-offset-4">
                {t('emergency', { number: clinic.emergencyNumber })}
              </a>
            ) : (
              t('emergencyAnywhere')
            )}
          </p>
        </div>
      </main>
      <div aria-hidden className="hidden place-items-center bg-leaf-wash p-12 lg:grid">
        <SignInTree month={new Date().getMonth() + 1} />
      </div>
    </div>
  );
}
