import { useState } from 'react';
import type { StaffPerson } from '#shared/people/contract.ts';
import { isGuardedRole, staffRoles } from '#shared/people/two-person-acts.ts';
import { ReasonDialog } from '#src/app/ReasonDialog.tsx';
import { Refused } from '#src/app/Refused.tsx';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { useGrantRole, useRemoveRole } from './queries.ts';
import { whyNotGive, whyNotRemove } from './role-limits.ts';
import { roleDetails, roleWords } from './words.ts';

type StaffRole = (typeof staffRoles)[number];

type Props = {
  person: StaffPerson;
  /** Everybody of the clinic: the last administrator stays one. */
  people: StaffPerson[];
  meId: string;
  onKept: (words: string) => void;
};

/** What somebody may do. Giving power over others takes a second person; taking a role away is at once. */
export function RolesSection({ person, people, meId, onKept }: Props) {
  const grant = useGrantRole(person.id);
  const remove = useRemoveRole(person.id);
  const [giving, setGiving] = useState<StaffRole | null>(null);
  const [taking, setTaking] = useState<StaffRole | null>(null);

  return (
    <section aria-labelledby="roles-heading">
      <SectionHeading id="roles-heading" wire>
        Roles
      </SectionHeading>
      <ul>
        {staffRoles.map((role) => {
          const held = person.roles.includes(role);
          const waits = person.waiting.some((act) => act.role === role);
          const limits = { person, people, meId };
          const blocked = held ? whyNotRemove(limits, role) : whyNotGive(limits, role);
          return (
            <li
              key={role}
              className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-wire py-2.5 leading-snug last:border-b-0"
            >
              <div className="min-w-0 grow basis-56">
                <p className={held ? 'font-bold' : 'text-ink-soft'}>
                  {roleWords[role]}
                  {held ? null : waits ? ' · waits for a second person' : ' · not held'}
                </p>
                <p className="text-sm text-ink-soft">{blocked ?? roleDetails[role]}</p>
              </div>
              {!person.active || waits || blocked !== null ? null : (
                <Button
                  variant="quiet"
                  aria-label={`${held ? 'Remove' : 'Give'} ${roleWords[role]}`}
                  onClick={() => {
                    grant.reset();
                    remove.reset();
                    if (held) setTaking(role);
                    else setGiving(role);
                  }}
                >
                  {held ? 'Remove' : 'Give'}
                </Button>
              )}
            </li>
          );
        })}
      </ul>
      {giving === null ? null : (
        <ReasonDialog
          title={`Give ${person.name} the role ${roleWords[giving]}`}
          consequence={
            isGuardedRole(giving)
              ? 'This role gives power over others, so a second person must confirm. Until then it is not given.'
              : 'It holds at once, also on screens that are open.'
          }
          reasonLabel="Why?"
          submitLabel={isGuardedRole(giving) ? 'Ask a second person' : 'Give the role'}
          onClose={() => setGiving(null)}
          act={{
            busy: grant.isPending,
            error: grant.error,
            onSubmit: (reason) =>
              grant.mutate(
                { role: giving, reason },
                {
                  onSuccess: () => {
                    setGiving(null);
                    onKept(
                      isGuardedRole(giving)
                        ? `${roleWords[giving]} waits for a second person.`
                        : `${roleWords[giving]} is given.`,
                    );
                  },
                },
              ),
          }}
        />
      )}
      <AlertDialog
        open={taking !== null}
        onOpenChange={(open) => {
          if (!open) setTaking(null);
        }}
        title={taking === null ? '' : `Take the role ${roleWords[taking]} from ${person.name}?`}
        description={
          <>
            <p>It ends at once, also on screens that are open.</p>
            <Refused error={remove.error} />
          </>
        }
        cancelLabel="Keep"
        confirm={{
          label: 'Remove the role',
          danger: true,
          busy: remove.isPending,
          onConfirm: () => {
            if (taking === null) return;
            remove.mutate(taking, {
              onSuccess: () => {
                setTaking(null);
                onKept(`${roleWords[taking]} is removed.`);
              },
            });
          },
        }}
      />
    </section>
  );
}
