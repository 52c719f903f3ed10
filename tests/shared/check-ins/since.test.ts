import { expect, test } from 'vitest';
import { sinceLastCheckIn } from '#shared/check-ins/since.ts';
import checkInWords from '#src/locales/en/check-in.json' with { type: 'json' };
import { textAt } from '../words-of.ts';

// domain.md section 3: "since your last check-in (Fri)"; the first ever asks "since surgery".
test.each([
  ['the first check-in ever', null, { key: 'check-in:since.surgery', date: null }],
  ['a second one on the day', '2025-12-01', { key: 'check-in:since.today', date: null }],
  ['yesterday', '2025-11-30', { key: 'check-in:since.weekday', date: '2025-11-30' }],
  ['six days ago', '2025-11-25', { key: 'check-in:since.weekday', date: '2025-11-25' }],
  [
    'a week ago, when the weekday is no longer clear',
    '2025-11-24',
    { key: 'check-in:since.date', date: '2025-11-24' },
  ],
])('the questions say since when: %s', (_, last, since) => {
  expect(sinceLastCheckIn(last, '2025-12-01')).toEqual(since);
  expect(textAt({ 'check-in': checkInWords }, since.key)).not.toBeNull();
});
