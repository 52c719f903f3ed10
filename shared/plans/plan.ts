import { z } from 'zod';

const code = z.string().regex(/^[a-z][a-z-]{1,59}$/);
const week = z.number().int().min(0).max(104);
const range = z.tuple([z.number().int().positive(), z.number().int().positive()]);
const sources = z.array(z.string().min(1)).min(1);

const phase = z.strictObject({
  code,
  /** The trade's name, for clinicians; the patient's words stand in the plan's texts under the code. */
  name: z.string().min(1),
  usualStartWeek: week,
  /** Null for the last phase, which has no usual end. */
  usualEndWeek: week.nullable(),
  /** What a clinician checks before the phase is opened. Null for the first, which opens with surgery. */
  gate: z.string().nullable(),
  sources,
});

const precaution = z.strictObject({
  code,
  /** What to avoid, for clinicians. */
  clinicianText: z.string().min(1),
  why: z.string().min(1),
  exception: z.string().nullable(),
  restrictFromWeek: week,
  /** A clinician may lift it from then; before, only on the surgeon's recorded instruction. */
  liftEarliestWeek: week,
  /** It falls due for sign-off then, and stays in force until it is signed off. */
  liftUsualWeek: week,
  limitDegrees: z.array(z.strictObject({ fromWeek: week, degrees: z.number() })).nullable(),
  publishedRange: z.tuple([z.number(), z.number()]).nullable(),
  /** The name of a drawing in the icon set. */
  icon: z.string().min(1),
  sources,
});

const exercise = z.strictObject({
  code,
  name: z.string().min(1),
  fromWeek: week,
  usualFromWeek: week,
  reps: range.nullable(),
  holdSeconds: range.nullable(),
  sessionsPerDay: range.nullable(),
  equipment: z.string().nullable(),
  substitute: z.string().nullable(),
  limit: z.string().nullable(),
  note: z.string().nullable(),
  /** It moves or loads the shoulder joint, so a finding that pauses the loading exercises stops it. */
  loadsShoulder: z.boolean(),
  sources,
});

/** What a recovery plan holds. Versioned data that a clinic reviews, adopts and edits. */
export const planContentSchema = z.strictObject({
  code,
  version: z.number().int().positive(),
  procedure: z.string().min(1),
  /** Shown with every shipped default. */
  notice: z.string().min(1),
  phases: z.array(phase).min(1),
  precautions: z.array(precaution),
  exercises: z.array(exercise),
});

export type PlanContent = z.output<typeof planContentSchema>;
export type PlanPhase = PlanContent['phases'][number];
export type PlanPrecaution = PlanContent['precautions'][number];
export type PlanExercise = PlanContent['exercises'][number];

/** A clinician's act on a plan. Only these open a phase or lift a precaution; the calendar never does. */
export type SignOff = { kind: 'open-phase' | 'lift-precaution'; code: string; on: string };
