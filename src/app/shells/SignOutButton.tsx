import { LogOut } from 'lucide-react';
import { lazy, Suspense, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { hasUnsent } from '#src/features/check-ins/kept.ts';
import { useMe } from '../session.tsx';
import { useSignOut } from '../sign-out.ts';

const UnsentDialog = lazy(async () => ({ default: (await import('./UnsentDialog.tsx')).UnsentDialog }));

/** The way out of a patient's or caregiver's page; it asks first where something is not sent. */
export function SignOutButton() {
  const { t } = useTranslation(['app', 'leaving']);
  const me = useMe();
  const signOut = useSignOut();
  const [asking, setAsking] = useState(false);
  return (
    <div>
      <Button
        variant="outline"
        icon={LogOut}
        busy={signOut.isPending}
        onClick={() => (hasUnsent(me) ? setAsking(true) : signOut.mutate())}
      >
        {t('account.signOut')}
      </Button>
      <p role="alert" className="mt-2 font-bold text-clay empty:hidden">
        {signOut.isError ? t('leaving:signingOut.failed') : null}
      </p>
      {asking ? (
        <Suspense>
          <UnsentDialog onStay={() => setAsking(false)} />
        </Suspense>
      ) : null}
    </div>
  );
}
