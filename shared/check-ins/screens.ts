import type { AnswerKey, Answers } from './answers.ts';
import type { DangerCode, SymptomCode, TileCode } from './symptoms.ts';

/** The daily check-in, or the symptom part alone, which stands on Today at any hour. */
export type CheckInMode = 'full' | 'something-new';

/** What decides, beside the answers, which questions and choices are offered. */
export type AskContext = { day: number; precautionsInForce: readonly string[] };

/** Conditions are data, so that a test can search the tree for answers that reach a rule. */
export type Condition =
  { key: AnswerKey; has: readonly string[] } | { key: 'painWorst'; atLeast: number } | { not: Condition };

export type Choice<Code extends string = string> = {
  code: Code;
  textKey: string;
  hintKey?: string;
  /** Offered from this week after surgery on. */
  fromWeek?: number;
  /** Offered only while this precaution is in force. */
  needsPrecaution?: string;
};

/**
 * The one answer that excludes the others, such as "none of these" or "as advised". It advances by itself, and
 * cannot be chosen while something in the list is ticked.
 */
export type AloneChoice = {
  code: 'none' | 'as-advised' | 'not-sure';
  textKey: string;
  /** "As advised" stands before the list; "none of these" stands after it, so that the list is read first. */
  place: 'first' | 'last';
  /** Written as true where "none" has a key of its own; elsewhere the code itself is the answer. */
  noneKey: 'dangerNone' | 'symptomsNone' | null;
};

export type Tile = {
  code: TileCode;
  textKey: string;
  examplesKey: string;
  choices: readonly Choice<SymptomCode>[];
};

type SingleKey =
  | 'painMedicine'
  | 'swelling'
  | 'swellingWhere'
  | 'swellingColour'
  | 'heldOffSince'
  | 'chestWhen'
  | 'faintedWhen'
  | 'woundColour'
  | 'woundThickness'
  | 'shaking'
  | 'numbWhere'
  | 'numbSince'
  | 'calfSigns'
  | 'selfHarm';
type SeveralKey = 'sling' | 'popSigns' | 'fallSigns' | 'woundSigns';
type CodeOf<K extends SeveralKey> = NonNullable<Answers[K]>[number];

type Asked = {
  id: string;
  titleKey: string;
  hintKey?: string;
  /** All of these must hold for the question to be asked; the whole chain of a follow-up is listed. */
  when: readonly Condition[];
  /** Left out of "something new", which asks about symptoms alone. */
  fullOnly: boolean;
  /** Asked only while some precaution is in force. */
  needsPrecautions?: boolean;
  /** How long an answer takes, for the seconds left. An estimate of ours (D). */
  seconds: number;
  /** Why this is asked, where the rules do not grade each of its answers. Null where they do. */
  askedFor: string | null;
};

type ScaleScreen = Asked & { kind: 'scale'; key: 'painNow' | 'painWorst' };
type SingleScreen = {
  [K in SingleKey]: Asked & {
    kind: 'single';
    key: K;
    choices: readonly Choice<NonNullable<Answers[K]>>[];
    /** From the mildest to the worst; "not sure" stands where it counts. */
    severity: readonly NonNullable<Answers[K]>[];
  };
}[SingleKey];
type SeveralScreen =
  | {
      [K in SeveralKey]: Asked & {
        kind: 'several';
        key: K;
        choices: readonly Choice<CodeOf<K>>[];
        alone: AloneChoice;
      };
    }[SeveralKey]
  | (Asked & { kind: 'several'; key: 'danger'; choices: readonly Choice<DangerCode>[]; alone: AloneChoice });
/** The choices are the precautions in force; their words come from the plan. */
type PrecautionsScreen = Asked & { kind: 'precautions'; key: 'heldOff'; alone: AloneChoice };
export type TilesScreen = Asked & {
  kind: 'tiles';
  key: 'symptoms';
  tiles: readonly Tile[];
  alone: AloneChoice;
};
type TemperatureScreen = Asked & { kind: 'temperature'; key: 'temperature'; notMeasuredKey: string };
type NoteScreen = Asked & { kind: 'note'; key: 'note' };

/** A list in which several answers may be ticked: more ticks are never milder. */
export type TickScreen = SeveralScreen | PrecautionsScreen | TilesScreen;
export type Screen = ScaleScreen | SingleScreen | TickScreen | TemperatureScreen | NoteScreen;

export const holds = (condition: Condition, answers: Answers): boolean => {
  if ('not' in condition) return !holds(condition.not, answers);
  const answer = answers[condition.key];
  if ('atLeast' in condition) return typeof answer === 'number' && answer >= condition.atLeast;
  if (Array.isArray(answer)) return answer.some((code) => condition.has.includes(code));
  return typeof answer === 'string' && condition.has.includes(answer);
};
