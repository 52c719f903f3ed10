import { describe, expect, test } from 'vitest';
import account from '#src/locales/en/account.json' with { type: 'json' };
import activity from '#src/locales/en/activity.json' with { type: 'json' };
import caregivers from '#src/locales/en/caregivers.json' with { type: 'json' };
import caring from '#src/locales/en/caring.json' with { type: 'json' };
import notifications from '#src/locales/en/notifications.json' with { type: 'json' };
import record from '#src/locales/en/record.json' with { type: 'json' };
import { readingGrade, syllablesOf, wordsIn } from './reading-grade.ts';
import { filled } from './words-of.ts';

const gaps = {
  name: 'Ines',
  email: 'ines@mail.example',
  date: '3 Dec',
  phone: '555-0100',
  number: '911',
  consent: 'by phone',
};

/** Every text of a file, each as a sentence of its own, as a screen shows them below each other. */
function sentencesIn(node: unknown): string[] {
  if (typeof node === 'string') return [/[.?!:]$/.test(node) ? node.replace(/:$/, '.') : `${node}.`];
  return Object.values(node as Record<string, unknown>).flatMap(sentencesIn);
}

const screens: Record<string, unknown> = { account, activity, caregivers, caring, record, notifications };
const textOf = (words: unknown): string => filled(sentencesIn(words).join(' '), gaps);

/** Words of three syllables or more that these screens need. Each is the plain word for its thing. */
const hardWords = [
  'america',
  'another',
  'computer',
  'connection',
  'emergency',
  'espalier',
  'invitation',
  'invited',
  'nobody',
  'reminder',
  'reminders',
  'surgery',
  'yesterday',
];

describe('the words of a person’s account', () => {
  test.each(Object.entries(screens))('the words of %s read at grade 6 or lower', (_, words) => {
    expect(readingGrade(textOf(words))).toBeLessThanOrEqual(6);
  });

  test.each(
    Object.entries(screens).flatMap(([file, words]) =>
      sentencesIn(words)
        .filter((text) => wordsIn(text).length >= 8)
        .map((text) => [file, filled(text, gaps)] as const),
    ),
  )('%s: "%s" is no hard sentence by itself', (_, text) => {
    expect(readingGrade(text)).toBeLessThanOrEqual(8);
  });

  test('hard words are few, and each is listed by name', () => {
    const hard = new Set(
      Object.values(screens)
        .flatMap((words) => wordsIn(textOf(words)))
        .filter((word) => syllablesOf(word) >= 3 && !word.includes('.') && !/\d/.test(word))
        .map((word) => word.toLowerCase()),
    );
    expect([...hard].sort()).toEqual([...hardWords].sort());
  });
});
