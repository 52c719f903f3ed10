import { useState } from 'react';
import type { ReactNode } from 'react';
import { reasonField } from '#shared/accounts/fields.ts';
import { Button } from '#src/components/Button.tsx';
import { Dialog } from '#src/components/Dialog.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { Refused } from './Refused.tsx';

type Props = {
  title: string;
  /** What follows, before anybody decides. */
  consequence: string;
  reasonLabel: string;
  submitLabel: string;
  danger?: boolean;
  /** What else the record needs. */
  children?: ReactNode;
  act: { busy: boolean; error: Error | null; onSubmit: (reason: string) => void };
  onClose: () => void;
};

/** Before what changes somebody's record: says what follows and asks why. A refusal keeps what was typed. */
export function ReasonDialog(props: Props) {
  const { title, consequence, reasonLabel, submitLabel, danger, children, act, onClose } = props;
  const [reason, setReason] = useState('');
  const [wrong, setWrong] = useState<string>();
  useBusyWhile(reason !== '');
  const refused =
    act.error instanceof ApiProblem
      ? act.error.fieldErrors.find(({ field }) => field === 'reason')?.message
      : undefined;

  function submit() {
    const checked = reasonField.safeParse(reason);
    setWrong(checked.error?.issues[0]?.message);
    if (checked.success && !act.busy) act.onSubmit(checked.data);
  }
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title={title}
      description={consequence}
      closeLabel="Close without saving"
      footer={
        <>
          <Button variant="outline" onClick={onClose}>
            Cancel
          </Button>
          <Button type="submit" form="reason-form" variant={danger ? 'danger' : 'primary'} busy={act.busy}>
            {submitLabel}
          </Button>
        </>
      }
    >
      <form
        id="reason-form"
        noValidate
        className="grid gap-5"
        onSubmit={(event) => {
          event.preventDefault();
          submit();
        }}
      >
        {children}
        <TextArea
          label={reasonLabel}
          value={reason}
          onChange={({ target }) => setReason(target.value)}
          error={wrong ?? refused}
          rows={2}
          dir="auto"
        />
        <Refused error={act.error} />
      </form>
    </Dialog>
  );
}
