import { lazy, Suspense } from 'react';
import { AccountMenu } from '../AccountMenu.tsx';
import { useMe } from '../session.tsx';

const PatientMenuItems = lazy(async () => ({
  default: (await import('./PatientMenuItems.tsx')).PatientMenuItems,
}));

/** The patient's own settings and the way out. What is in it is fetched when it is opened. */
export function PatientMenu() {
  const { name } = useMe();
  return (
    <AccountMenu name={name}>
      <Suspense>
        <PatientMenuItems />
      </Suspense>
    </AccountMenu>
  );
}
