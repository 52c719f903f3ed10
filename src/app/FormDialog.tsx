import { useId } from 'react';
import type { ReactNode, SubmitEvent } from 'react';
import { Button } from '#src/components/Button.tsx';
import { Dialog } from '#src/components/Dialog.tsx';

type Props = {
  title: string;
  description: string;
  submitLabel: string;
  danger?: boolean;
  busy: boolean;
  onSubmit: (event: SubmitEvent<HTMLFormElement>) => void;
  onClose: () => void;
  children: ReactNode;
};

/** One short form over the page: it is sent, or closed without saving. */
export function FormDialog({ title, description, submitLabel, danger, busy, ...props }: Props) {
  const formId = useId();
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) props.onClose();
      }}
      title={title}
      description={description}
      closeLabel="Close without saving"
      footer={
        <>
          <Button variant="outline" onClick={props.onClose}>
            Cancel
          </Button>
          <Button type="submit" form={formId} variant={danger ? 'danger' : 'primary'} busy={busy}>
            {submitLabel}
          </Button>
        </>
      }
    >
      <form id={formId} noValidate className="grid gap-5" onSubmit={props.onSubmit}>
        {props.children}
      </form>
    </Dialog>
  );
}
