import { z } from 'zod';
import { contract } from '../http/contract.ts';

const localDate = z.iso.date();
const dayNumber = z.number().int();

const trellis = z.object({
  arm: z.enum(['left', 'right']),
  today: dayNumber,
  phases: z.array(
    z.object({
      code: z.string(),
      name: z.string(),
      openedOnDay: dayNumber.nullable(),
      usualStartDay: dayNumber,
      usualEndDay: dayNumber.nullable(),
    }),
  ),
  days: z.array(z.object({ day: dayNumber, kind: z.enum(['check-in', 'flagged', 'missed']) })),
  review: z.object({ day: dayNumber, week: z.number().int(), date: localDate }).nullable(),
});

/** Texts of precautions and exercises travel as their codes; the client holds the words. */
export const today = z.object({
  firstName: z.string(),
  date: localDate,
  day: dayNumber,
  arm: z.enum(['left', 'right']),
  therapist: z.string().nullable(),
  surgeon: z.string(),
  surgeryDate: localDate,
  phase: z.object({ code: z.string(), usualEndDate: localDate.nullable() }),
  trellis,
  checkIns: z.object({
    done: z.number().int(),
    of: z.number().int(),
    todayAt: z.iso.datetime().nullable(),
  }),
  holdOff: z.array(
    z.object({
      code: z.string(),
      icon: z.string(),
      usualWeek: z.number().int(),
      usualDate: localDate,
      due: z.boolean(),
    }),
  ),
  exercises: z.array(
    z.object({
      code: z.string(),
      reps: z.tuple([z.number(), z.number()]).nullable(),
      holdSeconds: z.tuple([z.number(), z.number()]).nullable(),
      sessionsPerDay: z.tuple([z.number(), z.number()]).nullable(),
    }),
  ),
  /** An open finding has stopped the exercises until a clinician clears it. */
  paused: z.enum(['all', 'loading']).nullable(),
  /** The newest flag that a clinician has not closed, as far as the patient may know: who has read it. */
  openFlag: z
    .object({
      raisedAt: z.iso.datetime(),
      seenBy: z.string().nullable(),
      seenAt: z.iso.datetime().nullable(),
      claimedBy: z.string().nullable(),
    })
    .nullable(),
  unseenMessages: z.number().int(),
});
export type Today = z.output<typeof today>;

export const getToday = contract({
  method: 'get',
  path: '/api/today',
  summary: "The patient's own Today: where they are, what to hold off from, what to do.",
  status: 200,
  output: today,
});

export const getMyPlan = contract({
  method: 'get',
  path: '/api/my-plan',
  summary: 'The whole recovery plan by phase, with what is in force and when each line is looked at.',
  status: 200,
  output: z.object({
    procedure: z.string(),
    arm: z.enum(['left', 'right']),
    surgeryDate: localDate,
    therapist: z.string().nullable(),
    surgeon: z.string(),
    phases: z.array(
      z.object({
        code: z.string(),
        openedOn: localDate.nullable(),
        current: z.boolean(),
        usualStartWeek: z.number().int(),
        usualEndWeek: z.number().int().nullable(),
        usualEndDate: localDate.nullable(),
      }),
    ),
    holdOff: today.shape.holdOff,
    exercises: today.shape.exercises,
    changes: z.array(
      z.object({
        on: localDate,
        kind: z.enum(['open-phase', 'lift-precaution']),
        code: z.string(),
        by: z.string(),
      }),
    ),
  }),
});
export type MyPlan = z.output<NonNullable<(typeof getMyPlan)['output']>>;
