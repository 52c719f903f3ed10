import type { FieldValues, RegisterOptions } from 'react-hook-form';

/** What may be left out goes to the server as nothing, not as an empty line. */
export const emptyIsNothing = {
  setValueAs: (typed: string | null) => (typed === null || typed.trim() === '' ? null : typed),
} satisfies RegisterOptions<FieldValues>;
