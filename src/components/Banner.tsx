import { Info, OctagonAlert, TriangleAlert } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

type BannerTone = 'info' | 'warning' | 'danger';

const looks: Record<BannerTone, { ground: string; sign: string; icon: LucideIcon }> = {
  info: { ground: 'bg-leaf-wash', sign: 'text-leaf', icon: Info },
  warning: { ground: 'bg-ochre-wash', sign: 'text-ochre', icon: TriangleAlert },
  danger: { ground: 'bg-clay-wash', sign: 'text-clay', icon: OctagonAlert },
};

type Props = {
  tone?: BannerTone;
  title?: string;
  /** Another picture than the tone's own. */
  icon?: LucideIcon;
  children?: ReactNode;
  action?: ReactNode;
  /** Set where the banner arrives while the page is open: `status` waits its turn, `alert` interrupts. */
  announce?: 'status' | 'alert';
};

export function Banner({ tone = 'info', title, icon, children, action, announce }: Props) {
  const look = looks[tone];
  const Icon = icon ?? look.icon;
  return (
    <div
      role={announce}
      className={classNames(
        'flex flex-wrap items-center gap-x-4 gap-y-2 rounded border border-transparent px-4 py-3 leading-snug',
        look.ground,
      )}
    >
      <div className="flex min-w-0 grow basis-40 items-start gap-3">
        <Icon className={classNames('mt-px size-[1.3em] shrink-0', look.sign)} aria-hidden />
        <div className="min-w-0">
          {title ? <p className="font-bold">{title}</p> : null}
          {children}
        </div>
      </div>
      {action}
    </div>
  );
}
