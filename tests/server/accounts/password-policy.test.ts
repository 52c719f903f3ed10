import { describe, expect, it } from 'vitest';
import { newPasswordField } from '#shared/accounts/fields.ts';
import { Problem } from '#shared/problems/problems.ts';
import { refuseCommonPassword } from '#server/features/accounts/password-policy.ts';

const owner = { name: 'Wilhelmina Okonkwo', email: 'mina.okonkwo@garden-lane.example' };

const reasonFor = (password: string): string | null => {
  try {
    refuseCommonPassword(password, owner);
    return null;
  } catch (error) {
    if (!(error instanceof Problem) || error.code !== 'invalid-input') throw error;
    const [first] = error.extra.errors ?? [];
    expect(first?.field).toBe('password');
    return first?.message ?? '';
  }
};

describe('a new password', () => {
  it.each([
    'correct kettle battery garden',
    'the kettle sang on tuesday',
    'drei grüne Fahrräder im Hof',
    'un été à la montagne',
    'x9KfQ2mLp0ZtRw8',
    'okonkwo rides nine lazy tortoises',
  ])('is taken: "%s"', (password) => {
    expect(reasonFor(password)).toBeNull();
  });

  it.each([
    ['passwordpassword', 'repeats the same few characters'],
    ['aaaaaaaaaaaaaaaaaaaa', 'repeats the same few characters'],
    ['Summer2026!Summer2026!', 'repeats the same few characters'],
    ['abcdefghijklmnopqr', 'follows the alphabet, the numbers or the keys'],
    ['qwertyuiopasdfghjkl', 'many people use'],
    ['1q2w3e4r5t6y7u8i', 'many people use'],
    ['thisismypassword', 'many people use'],
    ['wilhelmina okonkwo', 'your name'],
    ['Okonkwo-Wilhelmina-1951', 'your name'],
    ['mina.okonkwo@garden-lane.example', 'your name, your e-mail address'],
    ['Espalier Espalier 7', 'the name of this product'],
    ['okonkwo espalier mina', 'your name'],
    ['Correct Horse Battery Staple!', 'passwords that many people use'],
  ])('is refused with the reason: "%s"', (password, reason) => {
    expect(reasonFor(password)).toContain(reason);
    expect(reasonFor(password)).toContain('A few words in a row');
  });

  it('is looked at in a quarter of a second, however it was built', () => {
    const worst = ['p@ssw0rd'.repeat(16), '4@$3!'.repeat(25), 'a1@$0'.repeat(25)];
    refuseCommonPassword('correct kettle battery garden', owner);
    for (const password of worst) {
      const startedAt = performance.now();
      expect(reasonFor(password)).not.toBeNull();
      // Far above what it takes, for a machine that is busy; without the limit on exchanges it is seconds.
      expect(performance.now() - startedAt).toBeLessThan(1500);
    }
  });
});

describe('the length of a new password', () => {
  const takes = (password: string) => newPasswordField.safeParse(password).success;

  it('is 15 to 128 code points, whatever they are, counted in NFC', () => {
    expect([14, 15, 128, 129].map((length) => takes('ü'.repeat(length)))).toEqual([false, true, true, false]);
    expect(takes('🪴'.repeat(15))).toBe(true);
    expect(takes('🪴'.repeat(14))).toBe(false);
    // 14 letters written as letter and accent are 28 code points before they are joined.
    expect(takes('u\u0308'.repeat(14))).toBe(false);
  });
});
