import type { LucideIcon } from 'lucide-react';
import { DropdownMenu as RadixMenu } from 'radix-ui';
import type { ReactElement, ReactNode } from 'react';

type MenuItem = { key: string; label: string; icon?: LucideIcon; onSelect: () => void };

type Props = {
  /** The button that opens it; it needs a name and must pass its props and its ref on. */
  trigger: ReactElement;
  /** Who or what the menu is about, at its head. */
  head?: ReactNode;
  items: MenuItem[];
};

export function DropdownMenu({ trigger, head, items }: Props) {
  return (
    <RadixMenu.Root modal={false}>
      <RadixMenu.Trigger asChild>{trigger}</RadixMenu.Trigger>
      <RadixMenu.Portal>
        <RadixMenu.Content
          sideOffset={6}
          collisionPadding={12}
          className="z-50 max-h-(--radix-dropdown-menu-content-available-height) max-w-[calc(100vw-1.5rem)] min-w-56 overflow-y-auto rounded border border-wire bg-paper p-1.5 shadow-2xl"
        >
          {head ? (
            <RadixMenu.Label className="px-3 py-2 text-sm text-ink-soft">{head}</RadixMenu.Label>
          ) : null}
          {items.map((item) => (
            <RadixMenu.Item
              key={item.key}
              onSelect={item.onSelect}
              className="flex min-h-target cursor-pointer items-center gap-3 rounded px-3 py-1.5 font-bold data-highlighted:bg-leaf-wash data-highlighted:text-leaf-deep"
            >
              {item.icon ? <item.icon className="size-5 shrink-0" aria-hidden /> : null}
              <span className="min-w-0">{item.label}</span>
            </RadixMenu.Item>
          ))}
        </RadixMenu.Content>
      </RadixMenu.Portal>
    </RadixMenu.Root>
  );
}
