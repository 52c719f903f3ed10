import { describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { readPhone } from '#server/features/people/new-person.ts';

/** Numbers of the reserved block 555-01xx, and such as libphonenumber's own metadata knows as costly. */
describe('a telephone number', () => {
  it.each([
    ['518-555-0142', '+15185550142'],
    ['(518) 555 0142', '+15185550142'],
    ['+1 518 555 0142', '+15185550142'],
  ])('is read as people write it: %s', (text, read) => {
    expect(readPhone(text, 'US')).toBe(read);
  });

  it.each(['0142', '555-0142', 'call me', '518-555-0142 ext. 3', '+1 900 555 0142'])(
    'that is none, or that cannot be rung, is refused with a sentence beside the field: %s',
    (text) => {
      const refusal = (() => {
        try {
          return readPhone(text, 'US', 'identity.phone');
        } catch (error) {
          return error;
        }
      })();
      expect(refusal).toBeInstanceOf(Problem);
      const [error, ...others] = (refusal as Problem).extra.errors ?? [];
      expect(others).toEqual([]);
      expect(error?.field).toBe('identity.phone');
      expect(error?.message).toMatch(/^[A-Z].*\w.*\.$/);
    },
  );
});
