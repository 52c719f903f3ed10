import { X } from 'lucide-react';
import { Dialog as RadixDialog } from 'radix-ui';
import type { ReactNode } from 'react';
import { IconButton } from './IconButton.tsx';
import { dialogPanelClass, dialogVeilClass } from './dialog-style.ts';
import { useReturnFocus } from './return-focus.ts';

type Props = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  description?: string;
  closeLabel: string;
  children: ReactNode;
  /** The buttons that end it. */
  footer?: ReactNode;
};

/** A question or a form over the page; Escape, the cross and a press outside close it. */
export function Dialog({ open, onOpenChange, title, description, closeLabel, children, footer }: Props) {
  const returnFocus = useReturnFocus();
  return (
    <RadixDialog.Root open={open} onOpenChange={onOpenChange}>
      <RadixDialog.Portal>
        <RadixDialog.Overlay className={dialogVeilClass} />
        <RadixDialog.Content
          {...returnFocus}
          className={dialogPanelClass}
          // Without a description Radix must be told so, or it names one that is not there.
          {...(description ? {} : { 'aria-describedby': undefined })}
        >
          <div className="flex items-start justify-between gap-4">
            <RadixDialog.Title className="min-w-0 pt-2 text-xl leading-tight">{title}</RadixDialog.Title>
            <RadixDialog.Close asChild>
              <IconButton icon={X} label={closeLabel} />
            </RadixDialog.Close>
          </div>
          {description ? (
            <RadixDialog.Description className="text-ink-soft">{description}</RadixDialog.Description>
          ) : null}
          <div className="mt-4">{children}</div>
          {footer ? <div className="mt-6 flex flex-wrap justify-end gap-3">{footer}</div> : null}
        </RadixDialog.Content>
      </RadixDialog.Portal>
    </RadixDialog.Root>
  );
}
