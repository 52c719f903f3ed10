import { useTranslation } from 'react-i18next';

/** Stands over every screen that is about somebody else: whose record it is, in words. */
export function CaringLine({ name }: { name: string }) {
  const { t } = useTranslation();
  return (
    <p
      data-dock="head"
      className="z-20 bg-bark-wash px-5 py-1.5 text-center font-bold text-ink [@media(min-height:34em)]:sticky [@media(min-height:34em)]:top-0"
    >
      {t('caring.for', { name })}
    </p>
  );
}
