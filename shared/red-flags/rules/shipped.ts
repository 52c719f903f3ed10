import type { Rule } from '../rule.ts';
import { armRules } from './arm.ts';
import { bodyEmergencies } from './body-emergencies.ts';
import { fallRules } from './falls.ts';
import { infectionRules } from './infection.ts';
import { painRules } from './pain.ts';
import { unclassified } from './unclassified.ts';
import { wellbeingRules } from './wellbeing.ts';

/** Names the set of rules that a check-in was evaluated with; it changes with any rule's version. */
export const rulesVersion = 'shipped-1';

/**
 * The rules that ship: starting points to be reviewed by a clinic's own clinicians. The safety net stands last,
 * since it looks at what the others took care of.
 */
export const rules: readonly Rule[] = [
  ...bodyEmergencies,
  armRules.compartment,
  infectionRules.possibleSepsis,
  fallRules.headInjury,
  armRules.dislocationWithNerve,
  wellbeingRules.selfHarm,
  armRules.dislocation,
  fallRules.fallWithInjury,
  infectionRules.feverHigh,
  infectionRules.woundPus,
  armRules.handWeakness,
  armRules.clotArm,
  wellbeingRules.clotLeg,
  painRules.painUncontrolled,
  wellbeingRules.fluids,
  wellbeingRules.water,
  armRules.popAlone,
  fallRules.fall,
  infectionRules.fever,
  painRules.painSevere,
  painRules.painRise,
  unclassified,
];
