import { useState } from 'react';
import { Button } from '#src/components/Button.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import type { PreviewCounts } from './import-counts.ts';

type Invite = 'email' | 'not-yet';

const options = [
  { value: 'email' as const, label: 'By e-mail, now' },
  { value: 'not-yet' as const, label: 'Not yet', detail: 'Later, one by one, from the caseload.' },
];

type Props = { counts: PreviewCounts; busy: boolean; onEnrol: (invite: Invite) => void };

/** All rows or none: where one is not right, it says what stands in the way instead. */
export function EnrolAll({ counts, busy, onEnrol }: Props) {
  const [invite, setInvite] = useState<Invite | null>(null);
  const [missing, setMissing] = useState(false);
  const { ready, withErrors, problems } = counts;
  if (withErrors > 0 || problems > 0) {
    return (
      <p className="font-bold">
        All or nobody is enrolled. Put right what is marked, then look at the list again.
      </p>
    );
  }
  if (ready === 0) return <p className="font-bold">There is nobody in the list to enrol.</p>;
  return (
    <div className="grid gap-4">
      <RadioTiles
        legend="How are they invited?"
        options={options}
        columns={2}
        value={invite}
        onChange={setInvite}
        error={missing && invite === null ? 'Choose how they are invited.' : undefined}
      />
      <div className="flex justify-end">
        <Button
          busy={busy}
          onClick={() => {
            setMissing(invite === null);
            if (invite !== null) onEnrol(invite);
          }}
        >
          {ready === 1 ? 'Enrol 1 patient' : `Enrol all ${ready} patients`}
        </Button>
      </div>
    </div>
  );
}
