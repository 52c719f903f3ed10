import { describe, expect, test } from 'vitest';
import { answersSchema } from '#shared/check-ins/answers.ts';
import { noteMaxCharacters } from '#shared/check-ins/note-length.ts';

const fieldsRefused = (input: unknown): string[] =>
  answersSchema
    .safeParse(input)
    .error?.issues.map((issue) =>
      [...issue.path, ...(issue.code === 'unrecognized_keys' ? issue.keys : [])].join('.'),
    ) ?? [];

describe('the answers of a check-in', () => {
  test('every question may be left unanswered', () => {
    expect(answersSchema.parse({})).toEqual({});
  });

  test('an ordinary check-in passes unchanged', () => {
    const answers = {
      painNow: 4,
      painWorst: 6,
      swelling: 'same',
      sling: ['as-advised'],
      dangerNone: true,
      symptoms: ['hot'],
      temperature: { unit: 'C', tenths: 379 },
      shaking: 'no',
      note: 'Slept well.',
    };
    expect(answersSchema.parse(answers)).toEqual(answers);
  });

  test.each([
    ['pain 11', { painNow: 11 }, 'painNow'],
    ['pain below zero', { painWorst: -1 }, 'painWorst'],
    ['pain that is not whole', { painNow: 4.5 }, 'painNow'],
    ['pain as text', { painNow: '4' }, 'painNow'],
    ['an unknown symptom', { symptoms: ['fall', 'sneeze'] }, 'symptoms.1'],
    ['an unknown danger sign', { danger: ['sneeze'] }, 'danger.0'],
    ['an unknown question', { colour: 'blue' }, 'colour'],
    ['a precaution that is no code', { heldOff: ['<b>'] }, 'heldOff.0'],
    ['"none" that is false', { dangerNone: false }, 'dangerNone'],
    ['200 kB of note', { note: 'x'.repeat(200_000) }, 'note'],
    ['a note one character too long', { note: 'x'.repeat(noteMaxCharacters + 1) }, 'note'],
  ])('%s is refused by the name of its field', (_, input, field) => {
    expect(fieldsRefused(input)).toEqual([field]);
  });

  test.each([
    ['a temperature in parts of a tenth', { unit: 'C', tenths: 379.5 }],
    ['Celsius entered as Fahrenheit', { unit: 'F', tenths: 380 }],
    ['a temperature without its unit', { tenths: 380 }],
    ['a temperature with more than that', { unit: 'C', tenths: 380, by: 'ear' }],
  ])('%s is refused as the temperature', (_, temperature) => {
    const fields = fieldsRefused({ temperature });
    expect(fields.length).toBeGreaterThan(0);
    expect(fields.every((field) => field.startsWith('temperature'))).toBe(true);
  });

  test('a note of the greatest length passes', () => {
    expect(fieldsRefused({ note: 'x'.repeat(noteMaxCharacters) })).toEqual([]);
  });
});
