import { Bell, ChevronRight, Eye, HeartHandshake, KeyRound, Users } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import { useRecord } from '#src/app/caring.ts';
import { chooseSide, useControlsSide } from '#src/app/free-hand.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { SignOutButton } from '#src/app/shells/SignOutButton.tsx';
import { Button } from '#src/components/Button.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';

type Place = { key: string; to: string; icon: LucideIcon };

/** What belongs to the person and not to the plan: the ways in, how they are reached, who helps, who looked. */
export function AccountPage() {
  const { t } = useTranslation('account');
  const me = useMe();
  const { caring } = useRecord();
  const heading = usePageHeading(t('title'));
  const isOwn = caring === null;
  const places: Place[] = [
    { key: 'signIn', to: '/account/sign-in', icon: KeyRound },
    { key: 'notifications', to: '/account/notifications', icon: Bell },
    // What only the patient decides and reads is not offered to whoever looks after them.
    ...(isOwn
      ? [
          { key: 'caregivers', to: '/account/caregivers', icon: HeartHandshake },
          { key: 'activity', to: '/account/activity', icon: Eye },
        ]
      : []),
    ...(me.caresFor.length > 0 ? [{ key: 'caring', to: '/caring', icon: Users }] : []),
  ];
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-8">
      <PageHeader
        title={t('title')}
        detail={t('signedInAs', { name: me.name, email: me.email })}
        headingRef={heading}
      />
      <ul className="border-t border-wire">
        {places.map(({ key, ...place }) => (
          <PlaceRow key={key} {...place} title={t(`go.${key}.title`)} detail={t(`go.${key}.detail`)} />
        ))}
      </ul>
      <Side />
      <SignOutButton />
    </div>
  );
}

function PlaceRow({ to, icon: Icon, title, detail }: Omit<Place, 'key'> & { title: string; detail: string }) {
  return (
    <li className="border-b border-wire">
      <Link
        to={to}
        className="-mx-2 flex min-h-18 items-center gap-4 rounded px-2 py-3 leading-snug hover:bg-leaf-wash"
      >
        <Icon className="size-6 shrink-0 text-bark" aria-hidden />
        <span className="min-w-0 grow">
          <span className="block font-bold">{title}</span>
          <span className="block text-ink-soft">{detail}</span>
        </span>
        <ChevronRight className="size-6 shrink-0" aria-hidden />
      </Link>
    </li>
  );
}

function Side() {
  const { t } = useTranslation('account');
  const { personId } = useMe();
  const side = useControlsSide();
  const other = side === 'left' ? 'right' : 'left';
  return (
    <section aria-labelledby="side" className="grid justify-items-start gap-2">
      <SectionHeading id="side">{t('side.title')}</SectionHeading>
      <p role="status">{t(`side.body.${side}`)}</p>
      <Button variant="outline" onClick={() => chooseSide(personId, other)}>
        {t(`side.put.${other}`)}
      </Button>
    </section>
  );
}
