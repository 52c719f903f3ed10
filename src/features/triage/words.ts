import type { Urgency } from '#shared/red-flags/findings.ts';
import type { FlagCase, FlagRow } from '#shared/triage/contract.ts';
import type { Outcome } from '#shared/triage/lifecycle.ts';

export const urgencyWords: Record<Urgency, string> = {
  emergency: 'Emergency',
  urgent: 'Urgent',
  'same-day': 'Same day',
  routine: 'Routine',
};

export const outcomeWords: Record<Outcome, string> = {
  'advised-by-phone': 'Advised by phone',
  'advised-by-message': 'Advised by message',
  'visit-brought-forward': 'Visit brought forward',
  'surgeons-office-informed': 'Surgeon’s office informed',
  'emergency-services': 'Emergency services',
  'plan-changed': 'Plan changed',
  'no-action-needed': 'No action needed',
  'entered-by-mistake': 'Entered by mistake',
};

type ProcedureWords = { short: string; long: string };

const procedureWords: Record<string, ProcedureWords> = {
  'reverse-replacement': { short: 'reverse TSA', long: 'reverse shoulder replacement' },
  'anatomic-replacement': { short: 'anatomic TSA', long: 'anatomic shoulder replacement' },
  'cuff-repair': { short: 'cuff repair', long: 'rotator cuff repair' },
  'fracture-fixation': { short: 'fracture fixation', long: 'fracture fixation' },
  'fracture-replacement': { short: 'fracture TSA', long: 'shoulder replacement for fracture' },
};

const wordsOf = (procedure: string): ProcedureWords =>
  procedureWords[procedure] ?? { short: procedure, long: procedure };

/** "day 24, L reverse TSA", as clinicians write it. */
export const shortOperation = ({ day, arm, procedure }: FlagRow['patient']): string =>
  `day ${day}, ${arm === 'left' ? 'L' : 'R'} ${wordsOf(procedure).short}`;

/** "left reverse shoulder replacement". */
export const longOperation = ({ arm, procedure }: FlagRow['patient']): string =>
  `${arm} ${wordsOf(procedure).long}`;

/** The name that a colleague would use: everything before the last word. */
export const firstNameOf = (name: string): string => name.trim().split(/\s+/u)[0] ?? name;

/** A row of the queue in one breath, for what is announced. */
export const announcementOf = ({ urgency, patient, headline }: FlagRow): string =>
  `${urgencyWords[urgency].toLowerCase()}, ${patient.name}, ${headline}`;

const eventWords: Record<FlagCase['events'][number]['kind'], string> = {
  raised: 'Raised',
  'raised-again': 'Raised again',
  seen: 'Seen by',
  claimed: 'Claimed by',
  released: 'Released by',
  replied: 'Reply sent by',
  'ticked-by-mistake': 'The patient says: ticked by mistake',
  closed: 'Closed by',
};

/** "Claimed by Callum Reyes"; what nobody did is a sentence without a name. */
export function eventSentence({ kind, by }: FlagCase['events'][number]): string {
  const words = eventWords[kind];
  if (!words.endsWith(' by')) return words;
  return by === null ? words.replace(/ by$/u, '') : `${words} ${by}`;
}

/** What an event carries besides, in words; ids and codes that say nothing to a reader are left out. */
export function eventDetail({ kind, detail }: FlagCase['events'][number]): string | null {
  if (detail === null) return null;
  if (kind === 'raised' || kind === 'raised-again') return urgencyWords[detail as Urgency] ?? null;
  if (kind === 'closed') return outcomeWords[detail as Outcome] ?? null;
  return null;
}

/** A short series in words: a picture's text equivalent. */
export function seriesInWords(
  label: string,
  values: readonly (number | null)[],
  usual: number | null,
): string {
  const told = values.map((value) => (value === null ? 'none' : String(value))).join(', ');
  const beside = usual === null ? '' : ` Usual ${usual}.`;
  return `${label}, ${values.length} days, oldest first: ${told}.${beside}`;
}

/** "Tuesday 1 December". A calendar date has no zone; it is read and written in UTC. */
export const roundDate = (localDate: string): string =>
  new Intl.DateTimeFormat('en-GB', {
    weekday: 'long',
    day: 'numeric',
    month: 'long',
    timeZone: 'UTC',
  }).format(new Date(`${localDate}T00:00:00Z`));
