import { useState } from 'react';
import type { PatientRecord } from '#shared/patients/contract.ts';
import type { PatientMove } from '#shared/patients/states.ts';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { Tag } from '#src/components/Tag.tsx';
import { formatDateAndYear, localDateOf } from '#src/lib/format.ts';
import { MoveDialog } from './MoveDialog.tsx';
import { backWords, moveWords, stateTones, stateWords } from './words.ts';

type Props = { record: PatientRecord; timeZone: string; onMoved: (words: string) => void };

/** Where the patient stands with the clinic, the moves there are from here, and how it came to be. */
export function StateSection({ record, timeZone, onMoved }: Props) {
  const [move, setMove] = useState<PatientMove | null>(null);
  const dateOf = (instant: string) => formatDateAndYear(localDateOf(instant, timeZone));
  const back = backWords(record);
  return (
    <section aria-labelledby="state-heading">
      <SectionHeading id="state-heading" wire>
        State
      </SectionHeading>
      <p>
        <Tag tone={stateTones[record.state]}>{stateWords[record.state]}</Tag>
        <span className="ml-2 text-sm text-ink-soft">
          {[record.stateSince ? `since ${dateOf(record.stateSince)}` : null, back]
            .filter((part) => part !== null)
            .join(', ')}
        </span>
      </p>
      {record.moves.length > 0 ? (
        <div className="mt-3 flex flex-wrap gap-2">
          {record.moves.map((name) => (
            <Button
              key={name}
              variant={moveWords[name].danger ? 'danger-outline' : 'outline'}
              onClick={() => setMove(name)}
            >
              {moveWords[name].button}
            </Button>
          ))}
        </div>
      ) : null}
      {record.changes.length > 0 ? (
        <ol className="mt-4 grid gap-3 text-sm">
          {record.changes.map((change) => (
            <li key={change.at} className="leading-snug">
              <p className="font-bold">
                {stateWords[change.from]} → {stateWords[change.to]}
                {change.backOn === null ? null : `, back ${formatDateAndYear(change.backOn)}`}
              </p>
              <p className="wrap-anywhere">“{change.reason}”</p>
              <p className="text-ink-soft">
                {change.by}, {dateOf(change.at)}
              </p>
            </li>
          ))}
        </ol>
      ) : null}
      {move === null ? null : (
        <MoveDialog
          record={record}
          move={move}
          onClose={() => setMove(null)}
          onMoved={(words) => {
            setMove(null);
            onMoved(words);
          }}
        />
      )}
    </section>
  );
}
