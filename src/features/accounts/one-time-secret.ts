import { useEffect, useState } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';

/**
 * The secret that a mail's link carries behind the `#`, which no server and no log sees. It is taken out of the
 * address bar and of the history at once, and lives on in this page's memory only.
 */
export function useOneTimeSecret(): string | null {
  const { hash, pathname } = useLocation();
  const navigate = useNavigate();
  const found = hash.slice(1);
  const [secret, setSecret] = useState(found === '' ? null : found);
  // Another link may be opened in the same tab.
  if (found !== '' && found !== secret) setSecret(found);
  useEffect(() => {
    if (found !== '') void navigate(pathname, { replace: true });
  }, [found, navigate, pathname]);
  return secret;
}
