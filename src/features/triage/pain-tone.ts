/** Two points are the change that counts in pain (Farrar et al., Pain 2001;94:149-158; M). */
const pointsThatCount = 2;

/** Clay when the last answer is well above the person's own usual; a colour only, the rules judge elsewhere. */
export function painTone(values: readonly (number | null)[], usual: number | null): 'leaf' | 'clay' {
  const last = values.at(-1) ?? null;
  return last !== null && usual !== null && last >= usual + pointsThatCount ? 'clay' : 'leaf';
}
