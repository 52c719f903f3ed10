import { useEffect, useLayoutEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { NavigationType, Outlet, useLocation, useNavigationType } from 'react-router-dom';
import { UpdateBanner } from './UpdateBanner.tsx';

/** What stands around every screen. */
export function RootLayout() {
  const { i18n } = useTranslation();
  const { key } = useLocation();
  const navigation = useNavigationType();
  useEffect(() => {
    document.documentElement.lang = i18n.language;
  }, [i18n.language]);
  // A new place begins at its top; going back, the browser itself finds where one was.
  useLayoutEffect(() => {
    if (navigation === NavigationType.Push) window.scrollTo(0, 0);
  }, [key, navigation]);
  return (
    <>
      <UpdateBanner />
      <Outlet />
    </>
  );
}
