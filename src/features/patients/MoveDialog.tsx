import { useState } from 'react';
import type { PatientRecord } from '#shared/patients/contract.ts';
import type { PatientMove } from '#shared/patients/states.ts';
import { ReasonDialog } from '#src/app/ReasonDialog.tsx';
import { TextField } from '#src/components/TextField.tsx';
import { ApiProblem } from '#src/lib/problem.ts';
import { useMovePatient } from './queries.ts';
import { moveWords } from './words.ts';

type Props = {
  record: PatientRecord;
  move: PatientMove;
  onClose: () => void;
  onMoved: (words: string) => void;
};

/** Asks what the record needs for a move, and says what follows from it. */
export function MoveDialog({ record, move, onClose, onMoved }: Props) {
  const act = useMovePatient(record.id);
  const [backOn, setBackOn] = useState('');
  const words = moveWords[move];
  const dateRefused =
    act.error instanceof ApiProblem
      ? act.error.fieldErrors.find(({ field }) => field === 'backOn')?.message
      : undefined;
  const openFlags =
    record.openFlags === 0
      ? ''
      : ` ${record.openFlags === 1 ? '1 flag is' : `${record.openFlags} flags are`} still open.`;
  return (
    <ReasonDialog
      title={`${words.button}: ${record.name}`}
      consequence={`${words.consequence}${words.danger ? openFlags : ''}`}
      reasonLabel={words.reason}
      submitLabel={words.button}
      danger={words.danger}
      onClose={onClose}
      act={{
        busy: act.isPending,
        error: act.error,
        onSubmit: (reason) =>
          act.mutate(
            { move, reason, backOn: move === 'pause' && backOn !== '' ? backOn : null },
            { onSuccess: () => onMoved(words.done) },
          ),
      }}
    >
      {move === 'pause' ? (
        <TextField
          type="date"
          label="Expected back on"
          hint="Leave it empty where nobody knows. Nothing resumes by itself."
          value={backOn}
          onChange={({ target }) => setBackOn(target.value)}
          error={dateRefused}
        />
      ) : null}
    </ReasonDialog>
  );
}
