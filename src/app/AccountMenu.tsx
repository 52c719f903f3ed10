import { useEffect, useId, useRef, useState } from 'react';
import type { ReactNode, RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import { Avatar } from '#src/components/Avatar.tsx';

type Props = {
  name: string;
  /** The button, for whoever has to give the focus back to it. */
  buttonRef: RefObject<HTMLButtonElement | null>;
  children: ReactNode;
};

/**
 * The account behind the person's initials: a plain disclosure with buttons in it. It is in the first load of
 * Today, which has no room for a menu library.
 */
export function AccountMenu({ name, buttonRef, children }: Props) {
  const { t } = useTranslation();
  const [open, setOpen] = useState(false);
  const box = useRef<HTMLDivElement>(null);
  const panelId = useId();
  useEffect(() => {
    if (!open) return undefined;
    const onOutside = (event: Event) => {
      if (event.target instanceof Node && !box.current?.contains(event.target)) setOpen(false);
    };
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return;
      setOpen(false);
      buttonRef.current?.focus();
    };
    document.addEventListener('pointerdown', onOutside);
    document.addEventListener('focusin', onOutside);
    document.addEventListener('keydown', onKey);
    return () => {
      document.removeEventListener('pointerdown', onOutside);
      document.removeEventListener('focusin', onOutside);
      document.removeEventListener('keydown', onKey);
    };
  }, [open, buttonRef]);
  return (
    <div ref={box} className="relative -mr-2 shrink-0">
      <button
        ref={buttonRef}
        type="button"
        aria-expanded={open}
        aria-controls={panelId}
        aria-label={t('account.menu', { name })}
        onClick={() => setOpen(!open)}
        className="grid size-target place-items-center rounded hover:bg-leaf-wash"
      >
        <Avatar name={name} decorative />
      </button>
      <div
        id={panelId}
        hidden={!open}
        className="absolute right-0 z-20 mt-1.5 w-max max-w-[calc(100vw-2.5rem)] rounded border border-wire bg-paper p-1.5 shadow-2xl"
      >
        <p className="px-3 py-2 font-bold">{name}</p>
        <div className="grid justify-items-stretch">{open ? children : null}</div>
      </div>
    </div>
  );
}
