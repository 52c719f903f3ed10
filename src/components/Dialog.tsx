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
  /** Without it there is no cross: for what must not be closed before its own button says so. */
  closeLabel?: string;
  children: ReactNode;
  /** The buttons that end it. */
  footer?: ReactNode;
};

/**
 * Where the screen is high enough, only the middle scrolls, so that the title and the buttons are always in
 * reach; on a low one they would leave no room for it, and the whole sheet scrolls. 4.75rem are the margin
 * around the sheet, its padding and its border.
 */
const columnClass =
  '[@media(min-height:34em)]:flex [@media(min-height:34em)]:max-h-[calc(100dvh-4.75rem)] flex-col';

/** As wide as the sheet, so that the focus rings at its edges are not cut off. */
const bodyClass = 'min-h-0 -mx-5 mt-3 px-5 py-1 [@media(min-height:34em)]:overflow-y-auto';

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
          <div className={columnClass}>
            <div className="flex items-start justify-between gap-4">
              <RadixDialog.Title className="min-w-0 pt-2 text-xl leading-tight">{title}</RadixDialog.Title>
              {closeLabel === undefined ? null : (
                <RadixDialog.Close asChild>
                  <IconButton icon={X} label={closeLabel} />
                </RadixDialog.Close>
              )}
            </div>
            {description ? (
              <RadixDialog.Description className="text-ink-soft">{description}</RadixDialog.Description>
            ) : null}
            <div className={bodyClass}>{children}</div>
            {footer ? <div className="mt-4 flex shrink-0 flex-wrap justify-end gap-3">{footer}</div> : null}
          </div>
        </RadixDialog.Content>
      </RadixDialog.Portal>
    </RadixDialog.Root>
  );
}
