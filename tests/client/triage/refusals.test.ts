import { describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';
import { refusalOf } from '#src/features/triage/refusals.ts';

const answered = (problem: Problem) => new ApiProblem(problem.toBody());

describe('what is said when a move is refused', () => {
  it('names the colleague who holds the flag, and says that what was typed is kept', () => {
    const conflict = answered(new Problem('claimed-by-other', undefined, { claimedBy: 'Callum Reyes' }));
    const { title, detail } = refusalOf(conflict, 'Your text is kept here.');
    expect(title).toBe('Callum Reyes has claimed this flag.');
    expect(detail).toContain('Your text is kept here.');
  });

  it('says of a claim that came second that it was not made', () => {
    const conflict = answered(new Problem('claimed-by-other', undefined, { claimedBy: 'Callum Reyes' }));
    expect(refusalOf(conflict).detail).toBe('Your claim was not made.');
  });

  it('shows what the server gave as its reason', () => {
    expect(refusalOf(answered(new Problem('state-conflict', 'This flag is closed.'))).title).toBe(
      'This flag is closed.',
    );
  });

  it('does not claim that nothing happened when there was no answer', () => {
    const { title, detail } = refusalOf(new Unreachable());
    expect(title).toBe('The server did not answer.');
    expect(detail).toContain('not known');
  });
});
