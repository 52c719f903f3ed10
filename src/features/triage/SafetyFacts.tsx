import type { FlagCase } from '#shared/triage/contract.ts';
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
      <a href={telephoneHref(number)} className="font-bold whitespace-nowrap underline underline-offset-3">
        {number}
      </a>
      {after}
    </>
  );
}

/** "none" is a fact on record; nothing on record is not the same, and is said so. */
function thinnerWords(bloodThinner: string | null): string {
  if (bloodThinner === null) return 'Blood thinner: not recorded, so ask.';
  return isNone(bloodThinner) ? 'No blood thinner.' : `Takes a blood thinner: ${bloodThinner}.`;
}

const isNone = (fact: string): boolean => /^(none|no|nil)\b/iu.test(fact.trim());

type Person = Pick<
  FlagCase['person'],
  'bloodThinner' | 'allergies' | 'emergencyContact' | 'chartNumber' | 'language'
>;

/** What must not be overlooked before anything is advised; what endangers is bold. */
export function SafetyFacts({ person }: { person: Person }) {
  const { bloodThinner, allergies } = person;
  // Bold only supports the words: a fact is always shown as it was recorded.
  const thinnerEndangers = bloodThinner === null || !isNone(bloodThinner);
  const allergyEndangers = allergies !== null && !isNone(allergies);
  return (
    <section aria-label="Safety facts" className="rounded bg-bark-wash px-4 py-3 leading-snug">
      <p>
        <span className={thinnerEndangers ? 'font-bold' : undefined}>{thinnerWords(bloodThinner)}</span>{' '}
        <span className={allergyEndangers ? 'font-bold' : undefined}>
          Allergies: {allergies ?? 'not recorded, so ask'}.
        </span>
      </p>
      <p className="mt-1 text-sm">
        Emergency contact: <WithCallLink text={person.emergencyContact} />
        &nbsp;· Chart {person.chartNumber}&nbsp;· Speaks {person.language}
      </p>
    </section>
  );
}
