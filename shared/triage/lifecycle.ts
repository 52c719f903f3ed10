export const flagStates = ['open', 'claimed', 'closed'] as const;
export type FlagState = (typeof flagStates)[number];
export type FlagMove = 'claim' | 'release' | 'close';

/**
 * What people can do with a flag. Nothing closes by itself. Only the system opens a closed flag again, when the
 * check-in that it came from is finished after all and brings a finding that nobody has seen (`raiseFlag`).
 */
const MOVES = {
  open: { claim: 'claimed', close: 'closed' },
  claimed: { release: 'open', close: 'closed' },
  closed: {},
} satisfies Record<FlagState, Partial<Record<FlagMove, FlagState>>>;

/** The state a move leads to, or null where that move does not exist. */
export const afterMove = (state: FlagState, move: FlagMove): FlagState | null => {
  const moves: Partial<Record<FlagMove, FlagState>> = MOVES[state];
  return moves[move] ?? null;
};

export const outcomes = [
  'advised-by-phone',
  'advised-by-message',
  'visit-brought-forward',
  'surgeons-office-informed',
  'emergency-services',
  'plan-changed',
  'no-action-needed',
  'entered-by-mistake',
] as const;
export type Outcome = (typeof outcomes)[number];

/** Outcomes that mean nothing without a few words, and what those words must say. */
export const outcomeNeeds: Partial<Record<Outcome, string>> = {
  'surgeons-office-informed': 'Name the person you spoke to.',
  'no-action-needed': 'Say why no action is needed.',
};
