import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { buildAnnounced } from '#src/lib/api.ts';
import { useIsBusy } from '#src/lib/busy.ts';

/** Says that a new version is ready, but never while anything is under way: then it waits until that is done. */
export function UpdateBanner() {
  const { t } = useTranslation();
  const [ready, setReady] = useState(false);
  const busy = useIsBusy();
  useEffect(() => buildAnnounced.subscribe(() => setReady(true)), []);
  return (
    // The live region stands empty from the start, or what arrives in it is not announced.
    <div role="status">
      {ready && !busy ? (
        <Banner
          action={
            <Button variant="outline" onClick={() => window.location.reload()}>
              {t('reload')}
            </Button>
          }
        >
          {t('failed.updated')}
        </Banner>
      ) : null}
    </div>
  );
}
