import { FormLine, FormNumber, FormRadios, FormSection, FormSelect, FormText } from './form-parts.tsx';
import {
  approachWords,
  bicepsWords,
  blockWords,
  procedureWords,
  sideWords,
  subscapularisWords,
} from './words.ts';

/** The operation card: what was done, and what the rules and the plan go by. */
export function OperationFields() {
  return (
    <FormSection title="Operation card">
      <FormSelect name="operation.procedure" label="Procedure" words={procedureWords} />
      <FormLine
        name="operation.surgeryDate"
        label="Date of surgery"
        type="date"
        hint="Day 0. A date to come makes a planned patient."
      />
      <FormRadios name="operation.arm" label="Operated arm" words={sideWords} />
      <FormLine name="operation.surgeon" label="Surgeon" dir="auto" />
      <FormSelect name="operation.approach" label="Approach" words={approachWords} />
      <FormSelect name="operation.subscapularis" label="Subscapularis" words={subscapularisWords} />
      <FormSelect name="operation.biceps" label="Biceps" words={bicepsWords} />
      <FormSelect name="operation.block" label="Nerve block" words={blockWords} />
      <FormLine
        name="operation.tuberosity"
        label="Tuberosity"
        hint="Empty where it does not apply."
        dir="auto"
      />
      <FormNumber
        name="operation.dressingUntilDay"
        label="Dressing stays until day"
        hint="As the surgeon ordered; the surgery date is day 0."
      />
      <div className="@3xl/clinic:col-span-2">
        <FormText
          name="operation.limits"
          label="Limits set in theatre"
          hint="For example “external rotation to 20°”. Empty where none was set."
        />
      </div>
    </FormSection>
  );
}
