import fc from 'fast-check';
import { expect, test } from 'vitest';
import { codeHashOf, shortCodeOf } from '#server/features/accounts/one-time-tokens.ts';
import { readLetterCode } from '#src/features/accounts/letter-code.ts';

test.each([
  ['7K3QD-9MXT2', '7K3QD-9MXT2'],
  ['7k3qd 9mxt2', '7K3QD-9MXT2'],
  [' 7 k 3 q d 9 m x t 2 ', '7K3QD-9MXT2'],
  ['7K3QD–9MXT2', '7K3QD-9MXT2'],
  ['O0OO0-IlL1i', '00000-11111'],
  ['uuuuu.vvvvv', 'VVVVV-VVVVV'],
  ['７Ｋ３ＱＤ９ＭＸＴ２', '7K3QD-9MXT2'],
])('“%s” is read as %s', (typed, code) => {
  expect(readLetterCode(typed)).toEqual({ code });
});

test.each([
  ['', { wrong: 'length', typed: 0 }],
  ['7K3QD', { wrong: 'length', typed: 5 }],
  ['7K3QD-9MXT2-7', { wrong: 'length', typed: 11 }],
  ['7K3QD-9MXT!', { wrong: 'characters' }],
  ['7K3QD-9MXTé', { wrong: 'characters' }],
])('“%s” is no code, and is told apart', (typed, wrong) => {
  expect(readLetterCode(typed)).toEqual(wrong);
});

/** Each letter as somebody may take it off paper: what Crockford's base 32 reads as the same digit. */
const lookalikes: Record<string, string[]> = {
  '0': ['0', 'o', 'O'],
  '1': ['1', 'i', 'I', 'l', 'L'],
  V: ['V', 'v', 'u'],
};

test('every code that the server prints is found by the server however it was typed', () => {
  const mistaken = (letter: string) =>
    fc.constantFrom(...(lookalikes[letter] ?? [letter, letter.toLowerCase()]));
  const typedCode = fc.uuid().chain((id) => {
    const code = shortCodeOf('a secret of the tests', id);
    const letters = [...code.replace('-', '')].map((letter) =>
      fc.tuple(mistaken(letter), fc.constantFrom('', ' ', '-')).map((parts) => parts.join('')),
    );
    return fc.tuple(
      fc.constant(code),
      fc.tuple(...letters).map((parts) => parts.join('')),
    );
  });
  fc.assert(
    fc.property(typedCode, ([code, typed]) => {
      const read = readLetterCode(typed);
      expect(read).toEqual({ code });
      expect(codeHashOf('key', typed)).toBe(codeHashOf('key', code));
    }),
  );
});
