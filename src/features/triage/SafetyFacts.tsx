import type { FlagCase } from '#shared/triage/contract.ts';
import { classNames } from '#src/components/class-names.ts';
import { telephoneHref } from '#src/lib/format.ts';

/** A telephone number inside a line of text: seven digits or more, with the marks that people put between. */
const numberInText = /\+?\(?\d[\d\s().-]{5,}\d/u;

/** The line with its telephone number, if it holds one, as a link that calls. */
function WithCallLink({ text }: { text: string }) {
  const number = numberInText.exec(text)?.[0];
  if (number === undefined) return text;
  const [before, after] = text.split(number);
  return (
    <>
      {before}
      <a href={telephoneHref(number)} className="font-bold underline underline-offset-3">
        {number}
      </a>
      {after}
    </>
  );
}

/** What must not be overlooked before anything is advised. Facts that are not known say so. */
export function SafetyFacts({ person }: { person: FlagCase['person'] }) {
  const { bloodThinner, allergies } = person;
  const danger = bloodThinner !== null || allergies !== null;
  return (
    <section
      aria-label="Safety facts"
      className={classNames('rounded px-4 py-3 leading-snug', danger ? 'bg-clay-wash' : 'bg-bark-wash')}
    >
      <p>
        {bloodThinner === null ? (
          'No blood thinner on record.'
        ) : (
          <strong>Takes a blood thinner: {bloodThinner}.</strong>
        )}{' '}
        {allergies === null ? 'No allergy on record.' : <strong>Allergies: {allergies}.</strong>}
      </p>
      <p className="mt-1 text-sm">
        Emergency contact: <WithCallLink text={person.emergencyContact} /> · Chart {person.chartNumber} ·
        Speaks {person.language}
      </p>
    </section>
  );
}
