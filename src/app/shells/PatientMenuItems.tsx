import { ArrowLeftRight, CircleUserRound, LogOut, Users } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import { hasUnsent } from '#src/features/check-ins/kept.ts';
import { useRecord } from '../caring.ts';
import { chooseSide, useControlsSide } from '../free-hand.ts';
import { useMe } from '../session.tsx';
import { useSignOut } from '../sign-out.ts';

type Props = {
  /** A sign-out would lose something that is not sent. */
  onAsk: () => void;
};

/** Whose record it is, the account, the side of the controls and the way out. */
export function PatientMenuItems({ onAsk }: Props) {
  const { t } = useTranslation(['app', 'account', 'leaving']);
  const me = useMe();
  const { caring } = useRecord();
  const signOut = useSignOut();
  const side = useControlsSide();
  const other = side === 'left' ? 'right' : 'left';
  return (
    <>
      {me.caresFor.length > 0 ? (
        <MenuLink icon={Users} to="/caring">
          {caring ? t('account:menu.caringFor', { name: caring.name }) : t('account:menu.caring')}
        </MenuLink>
      ) : null}
      <MenuLink icon={CircleUserRound} to="/account">
        {t('account:menu.account')}
      </MenuLink>
      <MenuButton icon={ArrowLeftRight} onClick={() => chooseSide(me.personId, other)}>
        {t(other === 'left' ? 'account:menu.controlsLeft' : 'account:menu.controlsRight')}
      </MenuButton>
      <MenuButton icon={LogOut} onClick={() => (hasUnsent(me) ? onAsk() : signOut.mutate())}>
        {t('account.signOut')}
      </MenuButton>
      <p role="alert" className="max-w-64 px-3 text-sm font-bold text-clay empty:hidden">
        {signOut.isError ? t('leaving:signingOut.failed') : null}
      </p>
    </>
  );
}

const itemClass =
  'flex min-h-target items-center gap-3 rounded px-3 py-1.5 text-left font-bold hover:bg-leaf-wash';

type MenuButtonProps = { icon: LucideIcon; onClick: () => void; children: string };

function MenuButton({ icon: Icon, onClick, children }: MenuButtonProps) {
  return (
    <button type="button" onClick={onClick} className={itemClass}>
      <Icon className="size-5 shrink-0" aria-hidden />
      <span className="min-w-0">{children}</span>
    </button>
  );
}

type MenuLinkProps = { icon: LucideIcon; to: string; children: string };

/** The page that it leads to takes the focus, and so the menu folds. */
function MenuLink({ icon: Icon, to, children }: MenuLinkProps) {
  return (
    <Link to={to} className={itemClass}>
      <Icon className="size-5 shrink-0" aria-hidden />
      <span className="min-w-0">{children}</span>
    </Link>
  );
}
