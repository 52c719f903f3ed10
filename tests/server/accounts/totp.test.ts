import { Secret, TOTP } from 'otpauth';
import { describe, expect, it } from 'vitest';
import { newTotpSecret, stepOfCode, totpUri } from '#server/features/accounts/totp.ts';
import { codeAt } from './ways.ts';

/**
 * RFC 6238, appendix B: the rows for SHA-1. The secret is the ASCII text of 20 bytes; the codes have 8 digits,
 * of which an app of 6 digits shows the last 6.
 */
const secret = Secret.fromLatin1('12345678901234567890').base32;
const vectors = [
  [59, '94287082'],
  [1_111_111_109, '07081804'],
  [1_111_111_111, '14050471'],
  [1_234_567_890, '89005924'],
  [2_000_000_000, '69279037'],
  [20_000_000_000, '65353130'],
] as const;

const at = (seconds: number) => new Date(seconds * 1000);

describe.each(vectors)('the vector of RFC 6238 at %i s', (seconds, code) => {
  it('is what the library makes with 8 digits', () => {
    const totp = new TOTP({ algorithm: 'SHA1', digits: 8, period: 30, secret });
    expect(totp.generate({ timestamp: seconds * 1000 })).toBe(code);
  });

  it('is taken by its last 6 digits, for the step of that second', () => {
    expect(stepOfCode(secret, code.slice(2), at(seconds))).toBe(Math.floor(seconds / 30));
  });

  it('is what the tests’ own generator makes', () => {
    expect(codeAt(secret, at(seconds))).toBe(code.slice(2));
  });
});

describe('a code', () => {
  const own = newTotpSecret();
  const now = at(1_900_000_015);
  const step = Math.floor(1_900_000_015 / 30);

  it('counts for its step when a clock is one step off, and no more', () => {
    const taken = [-2, -1, 0, 1, 2].map((steps) =>
      stepOfCode(own, codeAt(own, at(1_900_000_015 + steps * 30)), now),
    );
    expect(taken).toEqual([null, step - 1, step, step + 1, null]);
  });

  it('may be written with a gap, as apps show it', () => {
    const code = codeAt(own, now);
    expect(stepOfCode(own, `${code.slice(0, 3)} ${code.slice(3)}`, now)).toBe(step);
  });

  it.each(['', '12345', '1234567', 'abcdef', '١٢٣٤٥٦'])('that is none is refused: "%s"', (code) => {
    expect(stepOfCode(own, code, now)).toBeNull();
  });
});

it('makes secrets of 160 bits, anew each time, and an address that names Espalier', () => {
  const [first, second] = [newTotpSecret(), newTotpSecret()];
  expect(first).toMatch(/^[A-Z2-7]{32}$/);
  expect(first).not.toBe(second);
  const uri = new URL(totpUri(first, 'noor@clinic.example'));
  expect(`${uri.protocol}//${uri.host}`).toBe('otpauth://totp');
  expect(Object.fromEntries(uri.searchParams)).toEqual({
    issuer: 'Espalier',
    secret: first,
    algorithm: 'SHA1',
    digits: '6',
    period: '30',
  });
});
