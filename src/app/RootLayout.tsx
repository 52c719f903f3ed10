import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { Outlet, ScrollRestoration } from 'react-router-dom';
import { UpdateBanner } from './UpdateBanner.tsx';

/** What stands around every screen. */
export function RootLayout() {
  const { i18n } = useTranslation();
  useEffect(() => {
    document.documentElement.lang = i18n.language;
  }, [i18n.language]);
  return (
    <>
      <UpdateBanner />
      <Outlet />
      <ScrollRestoration />
    </>
  );
}
