/** The seven danger signs in the order they are asked (domain, section 3). The order is part of the product. */
export const dangerCodes = [
  'chest-or-breathing',
  'fainted-or-coughed-blood',
  'confusion-or-stroke',
  'hard-to-wake',
  'bleeding',
  'face-or-throat',
  'cold-hand',
] as const;

export type DangerCode = (typeof dangerCodes)[number];

/** The five tiles of "anything else", each with the symptoms it opens. */
export const symptomsByTile = {
  shoulder: ['pop-or-slip', 'changed-shape', 'fall', 'knock', 'tight-forearm', 'acromion-pain'],
  hand: ['hand-weak', 'hand-numb', 'hand-tingling', 'hand-colour', 'hand-sweat', 'hand-stiff'],
  wound: ['wound-fluid', 'wet-dressing', 'wound-opened', 'wound-redness', 'hot', 'chills'],
  leg: ['calf'],
  wellbeing: ['no-fluids', 'no-water', 'bowels', 'low-mood', 'call-me'],
} as const;

export type TileCode = keyof typeof symptomsByTile;
export type SymptomCode = (typeof symptomsByTile)[TileCode][number];

export const symptomCodes: readonly [SymptomCode, ...SymptomCode[]] = [
  ...symptomsByTile.shoulder,
  ...symptomsByTile.hand,
  ...symptomsByTile.wound,
  ...symptomsByTile.leg,
  ...symptomsByTile.wellbeing,
];

/** Hand colour, sweat and stiffness are offered from this week on (domain, section 3). */
export const lateHandSymptomsFromWeek = 3;
export const lateHandSymptoms: readonly SymptomCode[] = ['hand-colour', 'hand-sweat', 'hand-stiff'];
