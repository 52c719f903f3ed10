import type { PlanContent } from './plan.ts';
import { reverseReplacementExercises } from './reverse-replacement-exercises.ts';
import { reverseReplacementPrecautions } from './reverse-replacement-precautions.ts';

/** The one plan that ships: a starting point, with its values and sources; the surgeon's word overrides it. */
export const reverseReplacement: PlanContent = {
  code: 'reverse-replacement',
  version: 1,
  procedure: 'Reverse shoulder replacement',
  notice:
    "A starting point to be reviewed by your clinicians. The surgeon's own instructions win over any default.",
  phases: [
    {
      code: 'protect',
      name: 'Protect',
      usualStartWeek: 0,
      usualEndWeek: 6,
      gate: null,
      sources: ['common practice, no source'],
    },
    {
      code: 'motion',
      name: 'Motion',
      usualStartWeek: 6,
      usualEndWeek: 12,
      gate: 'Passive elevation to 120°, external rotation to 30°, painless deltoid contraction; never beyond the limit that the surgeon has set.',
      sources: [
        'common practice, no source',
        'SHORT trial protocol, Archives of Physiotherapy 2021;11:28, table 1',
      ],
    },
    {
      code: 'strength',
      name: 'Strength',
      usualStartWeek: 12,
      usualEndWeek: 16,
      gate: 'A clinician opens it; the criteria are the clinic’s own to set.',
      sources: ['common practice, no source'],
    },
    {
      code: 'return',
      name: 'Return',
      usualStartWeek: 16,
      usualEndWeek: null,
      gate: 'A clinician opens it; the criteria are the clinic’s own to set.',
      sources: ['common practice, no source'],
    },
  ],
  precautions: reverseReplacementPrecautions,
  exercises: reverseReplacementExercises,
};
