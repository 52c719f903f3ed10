/** Outside the fence, for the reasons given in the gate's schema. */
export const gateTables = [
  'authenticators',
  'browser_sessions',
  'credentials',
  'one_time_tokens',
  'passkey_challenges',
  'passkeys',
  'pending_sign_ins',
  'recovery_codes',
  'sign_in_attempts',
  'signed_in_sessions',
  'worker_heartbeats',
];
