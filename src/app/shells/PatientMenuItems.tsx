import { ArrowLeftRight, LogOut } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { hasUnsent } from '#src/features/check-ins/kept.ts';
import { chooseSide, useControlsSide } from '../free-hand.ts';
import { useMe } from '../session.tsx';
import { useSignOut } from '../sign-out.ts';

type Props = {
  /** A sign-out would lose something that is not sent. */
  onAsk: () => void;
};

/** The side of the controls and the way out. */
export function PatientMenuItems({ onAsk }: Props) {
  const { t } = useTranslation();
  const me = useMe();
  const signOut = useSignOut();
  const side = useControlsSide();
  const other = side === 'left' ? 'right' : 'left';
  return (
    <>
      <MenuButton icon={ArrowLeftRight} onClick={() => chooseSide(me.personId, other)}>
        {t(other === 'left' ? 'account.controlsLeft' : 'account.controlsRight')}
      </MenuButton>
      <MenuButton icon={LogOut} onClick={() => (hasUnsent(me) ? onAsk() : signOut.mutate())}>
        {t('account.signOut')}
      </MenuButton>
      <p role="alert" className="max-w-64 px-3 text-sm font-bold text-clay empty:hidden">
        {signOut.isError ? t('signingOut.failed') : null}
      </p>
    </>
  );
}

type MenuButtonProps = { icon: LucideIcon; onClick: () => void; children: string };

function MenuButton({ icon: Icon, onClick, children }: MenuButtonProps) {
  return (
    <button
      type="button"
      onClick={onClick}
      className="flex min-h-target items-center gap-3 rounded px-3 py-1.5 text-left font-bold hover:bg-leaf-wash"
    >
      <Icon className="size-5 shrink-0" aria-hidden />
      <span className="min-w-0">{children}</span>
    </button>
  );
}
