import { useController, useFormContext } from 'react-hook-form';
import type { listClinicians } from '#shared/patients/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { FormSection } from './form-parts.tsx';
import type { PatientValues } from './patient-fields.ts';
import { useClinicians } from './queries.ts';

type Clinician = OutputOf<typeof listClinicians>['clinicians'][number];

const nameOf = ({ name, credential }: Clinician): string =>
  credential === null ? name : `${name}, ${credential}`;

type Props = {
  /** Who is on the team so far: some of them may no longer be among the clinic's clinicians. */
  members?: Clinician[];
};

/** Who looks after the patient, and which of them leads. */
export function CareTeamField({ members = [] }: Props) {
  const clinicians = useClinicians();
  if (clinicians.data) {
    const listed = new Set(clinicians.data.map(({ personId }) => personId));
    const former = members.filter(({ personId }) => !listed.has(personId));
    return <Team clinicians={[...clinicians.data, ...former]} />;
  }
  return (
    <FormSection title="Care team">
      {clinicians.error ? (
        <ErrorState
          title="The clinicians could not be loaded."
          retry={{
            label: 'Try again',
            onRetry: () => void clinicians.refetch(),
            busy: clinicians.isFetching,
          }}
        />
      ) : (
        <LoadingState label="The clinicians are loading" />
      )}
    </FormSection>
  );
}

function Team({ clinicians }: { clinicians: Clinician[] }) {
  const { control } = useFormContext<PatientValues>();
  const { field, fieldState } = useController({ control, name: 'careTeam' });
  const team = field.value ?? [];
  const message = fieldState.error?.message;
  const isOn = (personId: string) => team.some((member) => member.personId === personId);

  function toggle(personId: string, on: boolean) {
    const others = team.filter((member) => member.personId !== personId);
    field.onChange(on ? [...others, { personId, isLead: false }] : others);
  }
  /** Whoever leads is on the team. */
  function lead(personId: string) {
    const members = isOn(personId) ? team : [...team, { personId, isLead: true }];
    field.onChange(members.map((member) => ({ ...member, isLead: member.personId === personId })));
  }
  return (
    <FormSection title="Care team" note="Choose who looks after the patient, and one lead therapist.">
      <fieldset
        className="min-w-0 @3xl/clinic:col-span-2"
        aria-describedby={message ? 'care-team-error' : undefined}
      >
        <legend className="sr-only">Care team</legend>
        <ul>
          {clinicians.map((clinician) => {
            const { personId } = clinician;
            const leads = team.some((member) => member.personId === personId && member.isLead);
            return (
              <li
                key={personId}
                className="flex flex-wrap items-center gap-x-6 border-b border-wire last:border-b-0"
              >
                <div className="min-w-0 grow basis-60">
                  <Checkbox
                    name="careTeam"
                    label={nameOf(clinician)}
                    checked={isOn(personId)}
                    onChange={({ target }) => toggle(personId, target.checked)}
                  />
                </div>
                <label className="flex min-h-target items-center gap-2.5">
                  <input
                    type="radio"
                    name="careTeamLead"
                    aria-label={`${clinician.name} leads`}
                    checked={leads}
                    onChange={() => lead(personId)}
                    className="size-5 accent-leaf"
                  />
                  Leads
                </label>
              </li>
            );
          })}
        </ul>
        {message ? (
          <p id="care-team-error" className="mt-1.5 text-sm font-bold text-clay">
            {message}
          </p>
        ) : null}
      </fieldset>
    </FormSection>
  );
}
