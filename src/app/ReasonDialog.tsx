import { useState } from 'react';
import type { ReactNode } from 'react';
import { reasonField } from '#shared/accounts/fields.ts';

import { TextArea } from '#src/components/TextArea.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';
import { ApiProblem } from '#src/lib/problem.ts';
import { FormDialog } from './FormDialog.tsx';
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
    <FormDialog
      title={title}
      description={consequence}
      submitLabel={submitLabel}
      danger={danger ?? false}
      busy={act.busy}
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      onClose={onClose}
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
    </FormDialog>
  );
}
