import { lazy, Suspense, useRef, useState } from 'react';
import { loadWords } from '#src/lib/i18n.ts';
import { AccountMenu } from '../AccountMenu.tsx';
import { useMe } from '../session.tsx';

const PatientMenuItems = lazy(async () => {
  const [module] = await Promise.all([import('./PatientMenuItems.tsx'), loadWords(['account', 'leaving'])]);
  return { default: module.PatientMenuItems };
});
const UnsentDialog = lazy(async () => ({ default: (await import('./UnsentDialog.tsx')).UnsentDialog }));

/**
 * The patient's own settings and the way out, which asks first where something is not sent. What is in it is
 * fetched when it is opened. The question stands outside the menu, which folds as soon as the focus leaves it.
 */
export function PatientMenu() {
  const me = useMe();
  const [asking, setAsking] = useState(false);
  const button = useRef<HTMLButtonElement>(null);
  function ask() {
    // The question gives the focus back to where it was, and the menu's own buttons are gone by then.
    button.current?.focus();
    setAsking(true);
  }
  return (
    <>
      <AccountMenu name={me.name} buttonRef={button}>
        <Suspense>
          <PatientMenuItems onAsk={ask} />
        </Suspense>
      </AccountMenu>
      {asking ? (
        <Suspense>
          <UnsentDialog onStay={() => setAsking(false)} />
        </Suspense>
      ) : null}
    </>
  );
}
