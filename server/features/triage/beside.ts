import type { Answers } from '#shared/check-ins/answers.ts';
import type { FlagCase } from '#shared/triage/contract.ts';

type Row = FlagCase['beside'][number];

const slingWords: Record<NonNullable<Answers['sling']>[number], string> = {
  'as-advised': 'As advised',
  'sling-off-more': 'Off more than advised',
  'slept-without': 'Slept without',
  'held-off': 'Did something to hold off from',
};

const sentence = (code: string): string => {
  const words = code.replaceAll('-', ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
};

const joined = (codes: readonly string[] | undefined, none: boolean | undefined): string | null => {
  if (codes && codes.length > 0) return codes.map(sentence).join(', ');
  return none ? 'None of these' : null;
};

/** Questions whose answer is one code or several, in the order asked; shown only where they were answered. */
const plainQuestions: [keyof Answers, string][] = [
  ['painMedicine', 'Does medicine bring it down'],
  ['swelling', 'Swelling'],
  ['swellingWhere', 'Where it is swollen'],
  ['swellingColour', 'Tight, blue, red or purple'],
  ['heldOff', 'What was done'],
  ['heldOffSince', 'Since then'],
  ['chestWhen', 'Chest pain or breathing, when'],
  ['faintedWhen', 'Fainting or blood, when'],
  ['popSigns', 'After the pop or slip'],
  ['fallSigns', 'The fall'],
  ['woundColour', 'Color of the fluid'],
  ['woundThickness', 'Thickness of the fluid'],
  ['woundSigns', 'The wound'],
  ['shaking', 'Shaking chills'],
  ['numbWhere', 'Where it is numb'],
  ['numbSince', 'Numb since'],
  ['calfSigns', 'The calf'],
  ['selfHarm', 'Thoughts of self-harm'],
];

const temperatureWords = (temperature: NonNullable<Answers['temperature']>): string =>
  temperature === 'not-measured'
    ? 'Not measured'
    : `${(temperature.tenths / 10).toFixed(1)} °${temperature.unit}`;

const numberRow = (
  label: string,
  today: number | undefined,
  usual: number | null,
  days14: Row['days14'],
  unanswered: string,
): Row => ({
  label,
  today: today === undefined ? unanswered : String(today),
  usual: usual === null ? null : String(Math.round(usual)),
  days14,
});

/** What was answered, beside the person's own usual; one row a question, unanswered ones left out. */
export const besideUsual = (
  answers: Answers,
  usual: { painNow: number | null; painWorst: number | null },
  days14: { painNow: (number | null)[]; painWorst: (number | null)[] },
): Row[] => {
  // What is sent as something new between two check-ins begins after the questions about pain.
  const unanswered =
    answers.painNow === undefined && answers.painWorst === undefined ? 'not asked' : 'not answered';
  const rows: Row[] = [
    numberRow('Pain now', answers.painNow, usual.painNow, days14.painNow, unanswered),
    numberRow('Pain at worst', answers.painWorst, usual.painWorst, days14.painWorst, unanswered),
  ];
  const add = (label: string, today: string | null) => {
    if (today !== null) rows.push({ label, today, usual: null, days14: null });
  };
  add('Sling', answers.sling?.map((code) => slingWords[code]).join(', ') ?? null);
  add('Danger signs', joined(answers.danger, answers.dangerNone));
  add('Anything else', joined(answers.symptoms, answers.symptomsNone));
  for (const [key, label] of plainQuestions) {
    const value = answers[key];
    if (typeof value === 'string') add(label, sentence(value));
    else if (Array.isArray(value)) add(label, joined(value, false));
  }
  if (answers.temperature !== undefined) add('Temperature', temperatureWords(answers.temperature));
  return rows;
};
