import { useId } from 'react';
import { BloodThinnerField } from './BloodThinnerField.tsx';
import { FormLine, FormRadios, FormSection, FormText } from './form-parts.tsx';
import { sideWords } from './words.ts';

const timeZones = Intl.supportedValuesOf('timeZone');

const notAsked = 'Leave it empty where nobody has asked; write “none” where there are none.';

/** Who the patient is and how to reach them, and what must not be overlooked. */
export function IdentityFields() {
  const zonesId = useId();
  return (
    <>
      <FormSection title="Identity">
        <FormLine name="identity.name" label="Name" dir="auto" />
        <FormLine name="identity.chartNumber" label="Chart number" />
        <FormLine name="identity.birthDate" label="Date of birth" type="date" />
        <FormLine
          name="identity.email"
          label="E-mail"
          type="email"
          hint="The patient signs in with it; each person of the clinic has one of their own."
        />
        <FormLine name="identity.phone" label="Telephone" type="tel" />
        <FormLine name="identity.address" label="Address" dir="auto" />
        <FormLine name="identity.language" label="Language" hint="The one the patient speaks best." />
        <FormLine
          name="identity.timeZone"
          label="Time zone"
          list={zonesId}
          hint="Where the patient lives: days and reminders follow it."
        />
        <datalist id={zonesId}>
          {timeZones.map((zone) => (
            <option key={zone} value={zone} />
          ))}
        </datalist>
        <FormRadios name="identity.dominantHand" label="Dominant hand" words={sideWords} />
      </FormSection>
      <FormSection title="Safety facts" note="They stand at the head of every case.">
        <div className="@3xl/clinic:col-span-2">
          <BloodThinnerField />
        </div>
        <FormText name="identity.allergies" label="Allergies" hint={notAsked} />
        <FormText name="identity.mainMedicines" label="Main medicines" hint={notAsked} />
        <FormText
          name="identity.emergencyContact"
          label="Emergency contact"
          hint="Whom to call, and the number."
        />
        <FormText
          name="identity.equipmentAtHome"
          label="Equipment at home"
          hint="Such as a pulley or a stick. Leave it empty where nobody has asked."
        />
      </FormSection>
    </>
  );
}
