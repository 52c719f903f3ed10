import { AlertDialog as RadixAlertDialog } from 'radix-ui';
import type { ReactNode } from 'react';
import { Button } from './Button.tsx';
import { dialogPanelClass, dialogVeilClass } from './dialog-style.ts';
import { useReturnFocus } from './return-focus.ts';

type Props = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  /** What happens if one goes on. */
  description: ReactNode;
  cancelLabel: string;
  confirm: { label: string; onConfirm: () => void; danger?: boolean; busy?: boolean };
};

/**
 * Asks before something that cannot be taken back. The focus starts on the way out, and a press outside does
 * nothing. It stays open after the answer, so that the caller can show work and failure; the caller closes it.
 */
export function AlertDialog({ open, onOpenChange, title, description, cancelLabel, confirm }: Props) {
  const returnFocus = useReturnFocus();
  return (
    <RadixAlertDialog.Root open={open} onOpenChange={onOpenChange}>
      <RadixAlertDialog.Portal>
        <RadixAlertDialog.Overlay className={dialogVeilClass} />
        <RadixAlertDialog.Content {...returnFocus} className={dialogPanelClass}>
          <RadixAlertDialog.Title className="text-xl leading-tight">{title}</RadixAlertDialog.Title>
          <RadixAlertDialog.Description asChild>
            <div className="mt-2">{description}</div>
          </RadixAlertDialog.Description>
          <div className="mt-6 flex flex-wrap justify-end gap-3">
            <RadixAlertDialog.Cancel asChild>
              <Button variant="outline">{cancelLabel}</Button>
            </RadixAlertDialog.Cancel>
            <Button
              variant={confirm.danger ? 'danger' : 'primary'}
              busy={confirm.busy}
              onClick={confirm.onConfirm}
            >
              {confirm.label}
            </Button>
          </div>
        </RadixAlertDialog.Content>
      </RadixAlertDialog.Portal>
    </RadixAlertDialog.Root>
  );
}
