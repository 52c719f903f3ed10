import { useState } from 'react';
import type { StaffPerson } from '#shared/people/contract.ts';
import { ReasonDialog } from '#src/app/ReasonDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { useAskSecondFactorRemoval, useDeactivateStaff, useReactivateStaff } from './queries.ts';
import { whyNotDeactivate } from './role-limits.ts';

type Act = 'deactivate' | 'reactivate' | 'remove-second-factor';

const words: Record<
  Act,
  { button: string; title: string; consequence: string; done: string; danger?: boolean }
> = {
  deactivate: {
    button: 'Deactivate',
    title: 'End the access of',
    consequence:
      'Signed out at once on every device, and not let in again. What they did stays in the records under their name.',
    done: 'Access has ended, on every device.',
    danger: true,
  },
  reactivate: {
    button: 'Let in again',
    title: 'Let in again:',
    consequence: 'The roles hold as before, and the old password and second factor work again.',
    done: 'Access is given again.',
  },
  'remove-second-factor': {
    button: 'Lost second factor',
    title: 'Second factor lost by',
    consequence:
      'Make sure that it is them: see them, or ring a number you know. A second person must confirm; then they set up a new one at their next sign-in.',
    done: 'It waits for a second person.',
  },
};

type Props = { person: StaffPerson; people: StaffPerson[]; meId: string; onKept: (words: string) => void };

/** Ending and giving back access, and the way out for somebody whose second factor is gone. */
export function AccessSection({ person, people, meId, onKept }: Props) {
  const [asked, setAsked] = useState<Act | null>(null);
  const acts = {
    deactivate: useDeactivateStaff(person.id),
    reactivate: useReactivateStaff(person.id),
    'remove-second-factor': useAskSecondFactorRemoval(person.id),
  };
  const blocked = person.active ? whyNotDeactivate({ person, people, meId }) : null;
  const removalWaits = person.waiting.some(({ kind }) => kind === 'remove-second-factor');
  const act = asked === null ? null : acts[asked];
  const offered: Act[] = [
    ...(person.active && person.hasSecondFactor && !removalWaits ? (['remove-second-factor'] as const) : []),
    ...(person.active ? (blocked === null ? (['deactivate'] as const) : []) : (['reactivate'] as const)),
  ];
  return (
    <section aria-labelledby="access-heading">
      <SectionHeading id="access-heading" wire>
        Access
      </SectionHeading>
      <p>
        {person.active ? 'May sign in.' : 'Deactivated: may not sign in.'}{' '}
        {person.hasSecondFactor ? 'Second factor set up.' : 'No second factor yet.'}
      </p>
      {blocked === null ? null : <p className="text-sm text-ink-soft">{blocked}</p>}
      <div className="mt-3 flex flex-wrap gap-2">
        {offered.map((name) => (
          <Button
            key={name}
            variant={words[name].danger ? 'danger-outline' : 'outline'}
            onClick={() => {
              acts[name].reset();
              setAsked(name);
            }}
          >
            {words[name].button}
          </Button>
        ))}
      </div>
      {asked === null || act === null ? null : (
        <ReasonDialog
          title={`${words[asked].title} ${person.name}`}
          consequence={words[asked].consequence}
          reasonLabel="Why?"
          submitLabel={words[asked].button}
          danger={words[asked].danger}
          onClose={() => setAsked(null)}
          act={{
            busy: act.isPending,
            error: act.error,
            onSubmit: (reason) =>
              act.mutate(reason, {
                onSuccess: () => {
                  setAsked(null);
                  onKept(words[asked].done);
                },
              }),
          }}
        />
      )}
    </section>
  );
}
