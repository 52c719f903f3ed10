import type { TwoPersonAct } from '#shared/people/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Button } from '#src/components/Button.tsx';
import { Tag } from '#src/components/Tag.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { useDecideTwoPersonAct } from './queries.ts';
import { actStateWords, actWords } from './words.ts';

type Props = {
  acts: TwoPersonAct[];
  meId: string;
  nowMs: number;
  timeZone: string;
  onKept: (words: string) => void;
};

/** What one person asked for and a second one decides, or has decided. */
export function ActList({ acts, ...rest }: Props) {
  return (
    <ul>
      {acts.map((act) => (
        <ActRow key={act.id} act={act} {...rest} />
      ))}
    </ul>
  );
}

type RowProps = Omit<Props, 'acts'> & { act: TwoPersonAct };

function ActRow({ act, meId, nowMs, timeZone, onKept }: RowProps) {
  const moment = (instant: string) => formatMoment(instant, nowMs, timeZone);
  return (
    <li className="flex flex-wrap items-start gap-x-6 gap-y-3 border-b border-wire py-4 leading-snug last:border-b-0">
      <div className="min-w-0 grow basis-72">
        <p className="font-bold wrap-anywhere">
          {act.person.name}: {actWords(act)}
        </p>
        <p className="wrap-anywhere">“{act.reason}”</p>
        <p className="mt-0.5 text-sm text-ink-soft">
          Asked for by {act.requestedBy.name}, {moment(act.requestedAt)}
        </p>
        {act.state === 'waiting' ? null : (
          <p className="mt-1 text-sm">
            <Tag tone={act.state === 'confirmed' ? 'leaf' : 'bark'}>{actStateWords[act.state]}</Tag>{' '}
            <span className="text-ink-soft">
              {[act.decidedBy, act.decidedAt === null ? null : moment(act.decidedAt)]
                .filter((part) => part !== null)
                .join(', ')}
            </span>
          </p>
        )}
      </div>
      {act.state === 'waiting' ? <Decision act={act} meId={meId} onKept={onKept} /> : null}
    </li>
  );
}

/** Whoever asked may only withdraw, and nobody decides about themselves. */
function Decision({ act, meId, onKept }: Pick<RowProps, 'act' | 'meId' | 'onKept'>) {
  const decide = useDecideTwoPersonAct();
  const mine = act.requestedBy.id === meId;
  const aboutMe = act.person.id === meId;
  function answer(decision: 'confirm' | 'refuse' | 'withdraw', done: string) {
    decide.mutate({ actId: act.id, decision }, { onSuccess: () => onKept(done) });
  }
  return (
    <div className="grid justify-items-start gap-2">
      {mine ? (
        <>
          <p className="text-sm text-ink-soft">You asked for this, so another person decides.</p>
          <Button
            variant="outline"
            busy={decide.isPending}
            onClick={() => answer('withdraw', 'Withdrawn. Nothing has changed.')}
          >
            Withdraw
          </Button>
        </>
      ) : aboutMe ? (
        <p className="text-sm text-ink-soft">This is about you, so another person decides.</p>
      ) : (
        <div className="flex flex-wrap gap-2">
          <Button
            variant="outline"
            busy={decide.isPending}
            onClick={() => answer('refuse', 'Refused. Nothing has changed.')}
          >
            Refuse
          </Button>
          <Button busy={decide.isPending} onClick={() => answer('confirm', 'Confirmed. It holds now.')}>
            Confirm
          </Button>
        </div>
      )}
      <Refused error={decide.error} />
    </div>
  );
}
