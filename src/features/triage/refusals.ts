import { ApiProblem, Unreachable } from '#src/lib/problem.ts';

export type Refusal = { title: string; detail: string };

/**
 * Why a move on a flag did not happen, in words. `kept` says what became of what was typed, where something
 * was.
 */
export function refusalOf(error: unknown, kept: string | null = null): Refusal {
  const after = kept === null ? '' : ` ${kept}`;
  if (error instanceof ApiProblem) {
    if (error.code === 'claimed-by-other') {
      const holder = error.body.claimedBy ?? 'A colleague';
      // Where something was written or chosen, it is that which was refused and not a claim.
      const refused = kept === null ? 'Your claim was not made.' : `Nothing was changed.${after}`;
      return { title: `${holder} has claimed this flag.`, detail: refused };
    }
    if (error.code === 'internal' && error.body.reportId !== undefined) {
      return { title: error.message, detail: `Report ${error.body.reportId}.${after}` };
    }
    return { title: error.message, detail: `Nothing was changed.${after}` };
  }
  if (error instanceof Unreachable) {
    return {
      title: 'The server did not answer.',
      detail: `It is not known whether this was kept. Try again: a repeat does no harm.${after}`,
    };
  }
  return { title: 'Something went wrong on this screen.', detail: `Reload the page and try again.${after}` };
}
