import { useTranslation } from 'react-i18next';

/** Between two ways of which one is enough. */
export function OrLine() {
  const { t } = useTranslation('accounts');
  return (
    <div className="flex items-center gap-3 text-ink-soft">
      <span aria-hidden className="h-px grow bg-wire" />
      {t('or')}
      <span aria-hidden className="h-px grow bg-wire" />
    </div>
  );
}
