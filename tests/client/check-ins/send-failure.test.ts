import { describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { sendFailureOf } from '#src/features/check-ins/send-failure.ts';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';

const refused = (problem: Problem) => new ApiProblem(problem.toBody());

describe('a check-in that could not be sent', () => {
  it('leads back to the question whose answer was not accepted', () => {
    const failure = sendFailureOf(
      refused(
        new Problem('invalid-input', undefined, {
          errors: [{ field: 'answers.danger.0', message: 'This is not one of the answers.' }],
        }),
      ),
    );
    expect(failure).toMatchObject({ kind: 'invalid', screen: { id: 'danger' } });
  });

  it('says what was wrong also where no question is to blame', () => {
    const errors = [{ field: 'sentAt', message: 'That is no time.' }];
    const failure = sendFailureOf(refused(new Problem('invalid-input', undefined, { errors })));
    expect(failure).toEqual({ kind: 'invalid', message: 'That is no time.', screen: null });
  });

  it('tells a conflict and a lost line from a refusal', () => {
    expect(sendFailureOf(new Unreachable()).kind).toBe('unreachable');
    expect(sendFailureOf(refused(new Problem('id-conflict'))).kind).toBe('already-sent');
    expect(sendFailureOf(refused(new Problem('unavailable')))).toEqual({
      kind: 'refused',
      reason: 'The service is not ready. Please try again in a minute.',
    });
  });
});
