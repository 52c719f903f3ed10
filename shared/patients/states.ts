import type { LocalDate } from '../plans/calendar.ts';

/** Where a patient stands with the clinic (domain, section 2). */
export const patientStates = ['planned', 'active', 'paused', 'discharged', 'ended'] as const;
export type PatientState = (typeof patientStates)[number];

export const patientMoves = ['start', 'pause', 'resume', 'discharge', 'take-back', 'end'] as const;
export type PatientMove = (typeof patientMoves)[number];

const moves = {
  planned: { start: 'active', end: 'ended' },
  active: { pause: 'paused', discharge: 'discharged', end: 'ended' },
  paused: { resume: 'active', discharge: 'discharged', end: 'ended' },
  discharged: { 'take-back': 'active', end: 'ended' },
  ended: {},
} satisfies Record<PatientState, Partial<Record<PatientMove, PatientState>>>;

/** Where a move leads; undefined where there is no such move. */
export const stateAfter = (state: PatientState, move: PatientMove): PatientState | undefined =>
  (moves[state] as Partial<Record<PatientMove, PatientState>>)[move];

export const movesFrom = (state: PatientState): PatientMove[] =>
  patientMoves.filter((move) => stateAfter(state, move) !== undefined);

/**
 * What follows from a state. Whatever it is, what a device sends is kept and evaluated: an alert is never
 * refused. `watched` says that the clinic looks after what comes in; where it does not, the patient's screens
 * say so, since when, and whom to call.
 */
export const consequences = {
  planned: { watched: true, checkIns: false, reminders: false, silence: false, threads: true, signIn: true },
  active: { watched: true, checkIns: true, reminders: true, silence: true, threads: true, signIn: true },
  paused: { watched: true, checkIns: true, reminders: false, silence: false, threads: true, signIn: true },
  discharged: {
    watched: false,
    checkIns: false,
    reminders: false,
    silence: false,
    threads: false,
    signIn: true,
  },
  ended: { watched: false, checkIns: false, reminders: false, silence: false, threads: false, signIn: false },
} as const satisfies Record<PatientState, Record<string, boolean>>;

/** From the day of surgery on a planned patient is an active one, also where nobody has said so. */
export const stateOn = (state: PatientState, surgeryDate: LocalDate, today: LocalDate): PatientState =>
  state === 'planned' && today >= surgeryDate ? 'active' : state;

/** Nobody has heard from them: looked after, a day or more after surgery, and not one check-in yet. */
export const neverStarted = (state: PatientState, day: number, hasCheckedIn: boolean): boolean =>
  consequences[state].silence && day >= 1 && !hasCheckedIn;
