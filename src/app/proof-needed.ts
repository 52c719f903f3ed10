import { ApiProblem } from '#src/lib/problem.ts';

/** The server wants a fresh proof first. What was to be done has not been done. */
export const isProofNeeded = (error: unknown): boolean =>
  error instanceof ApiProblem && error.code === 'proof-needed';
