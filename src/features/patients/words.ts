import type { PatientLine, PatientRecord } from '#shared/patients/contract.ts';
import type { PatientMove, PatientState } from '#shared/patients/states.ts';
import type { TagTone } from '#src/components/Tag.tsx';
import { formatDate } from '#src/lib/format.ts';

type Operation = PatientRecord['operation'];

export const procedureWords: Record<Operation['procedure'], string> = {
  'reverse-replacement': 'Reverse shoulder replacement',
  'anatomic-replacement': 'Anatomic shoulder replacement',
  'cuff-repair': 'Rotator cuff repair',
  'fracture-fixation': 'Fracture fixation',
  'fracture-replacement': 'Shoulder replacement for fracture',
};

export const sideWords: Record<Operation['arm'], string> = { left: 'Left', right: 'Right' };

export const approachWords: Record<Operation['approach'], string> = {
  deltopectoral: 'Deltopectoral',
  'deltoid-split': 'Deltoid split',
};

export const subscapularisWords: Record<Operation['subscapularis'], string> = {
  repaired: 'Repaired',
  'not-repaired': 'Not repaired',
  osteotomy: 'Osteotomy',
};

export const bicepsWords: Record<Operation['biceps'], string> = {
  left: 'Left alone',
  tenodesis: 'Tenodesis',
};

export const blockWords: Record<Operation['block'], string> = {
  none: 'None',
  single: 'Single shot',
  'long-acting': 'Long-acting',
};

export const consentWords: Record<NonNullable<PatientRecord['consent']>['how'], string> = {
  signed: 'Signed',
  spoken: 'Spoken',
};

/** The choices of a form, in the order in which the words stand. */
export const optionsOf = <Value extends string>(words: Record<Value, string>) =>
  (Object.entries(words) as [Value, string][]).map(([value, label]) => ({ value, label }));

export const stateWords: Record<PatientState, string> = {
  planned: 'Planned',
  active: 'Active',
  paused: 'Paused',
  discharged: 'Discharged',
  ended: 'Ended',
};

export const stateTones: Record<PatientState, TagTone> = {
  planned: 'slate',
  active: 'leaf',
  paused: 'ochre',
  discharged: 'bark',
  ended: 'bark',
};

/** "Day 24", or how long it is until surgery. */
export function dayWords({ day }: Pick<PatientLine, 'day'>): string {
  if (day >= 0) return `Day ${day}`;
  return day === -1 ? 'Surgery tomorrow' : `Surgery in ${-day} days`;
}

/** Whole years on a calendar date. */
export function ageOn(birthDate: string, today: string): number {
  const years = Number(today.slice(0, 4)) - Number(birthDate.slice(0, 4));
  return today.slice(5) < birthDate.slice(5) ? years - 1 : years;
}

/** "back 12 Dec", for somebody who is paused. */
export const backWords = ({ state, backOn }: Pick<PatientLine, 'state' | 'backOn'>): string | null =>
  state === 'paused' && backOn !== null ? `back ${formatDate(backOn)}` : null;

type MoveWords = {
  button: string;
  /** What follows, before anybody decides. */
  consequence: string;
  reason: string;
  done: string;
  danger?: boolean;
};

export const moveWords: Record<PatientMove, MoveWords> = {
  start: {
    button: 'Start now',
    consequence: 'Daily check-ins and reminders begin. From the day of surgery on this happens by itself.',
    reason: 'Why now?',
    done: 'Started.',
  },
  pause: {
    button: 'Pause',
    consequence:
      'No reminders while paused, and no flag for silence. What the patient sends is still looked at, and messages stay open.',
    reason: 'Why? For example: in hospital, away.',
    done: 'Paused.',
  },
  resume: {
    button: 'Resume',
    consequence: 'Reminders begin again, and silence raises a flag again.',
    reason: 'What has changed?',
    done: 'Resumed.',
  },
  discharge: {
    button: 'Discharge',
    consequence:
      'The patient is told, with the date, that the clinic no longer watches. Threads close; no check-ins, no reminders. The patient can still sign in and read the record.',
    reason: 'Why? For example: goals reached.',
    done: 'Discharged. The patient is told.',
    danger: true,
  },
  'take-back': {
    button: 'Take back',
    consequence: 'The clinic watches again: check-ins, reminders and messages begin again.',
    reason: 'Why?',
    done: 'Taken back.',
  },
  end: {
    button: 'End',
    consequence:
      'The patient and every caregiver can no longer sign in. Threads close. The record is kept. This cannot be taken back.',
    reason: 'Why?',
    done: 'Ended.',
    danger: true,
  },
};
