import { describe, expect, test } from 'vitest';
import { darkTokens, lightTokens } from '../../../tailwind.config.ts';

type TokenName = keyof typeof lightTokens;

/** Relative luminance as WCAG 2.2 defines it. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((at) => {
    const channel = parseInt(hex.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(first: string, second: string): number {
  const [low = 0, high = 0] = [luminance(first), luminance(second)].sort((a, b) => a - b);
  return (high + 0.05) / (low + 0.05);
}

test('the measure gives the known ratios of black and of mid grey on white (WCAG 2.2)', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 5);
  expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
});

const themes = [
  { theme: 'light', tokens: lightTokens },
  { theme: 'dark', tokens: darkTokens },
];

const grounds: TokenName[] = ['paper', 'sheet'];
const washes: TokenName[] = ['leaf-wash', 'bark-wash', 'clay-wash', 'ochre-wash', 'slate-wash', 'moss-wash'];
const coloursWithWash: [TokenName, TokenName][] = [
  ['leaf', 'leaf-wash'],
  ['leaf-deep', 'leaf-wash'],
  ['bark', 'bark-wash'],
  ['clay', 'clay-wash'],
  ['ochre', 'ochre-wash'],
  ['slate', 'slate-wash'],
  ['moss', 'moss-wash'],
];

describe.each(themes)('in the $theme theme', ({ tokens }) => {
  const ratio = (text: TokenName, ground: TokenName) => contrast(tokens[text], tokens[ground]);

  test.each([...grounds, ...washes])('text on %s has a contrast of 7 to 1, soft text of 4.5', (ground) => {
    expect(ratio('ink', ground)).toBeGreaterThanOrEqual(7);
    expect(ratio('ink-soft', ground)).toBeGreaterThanOrEqual(4.5);
  });

  test.each(coloursWithWash)('%s can be read on %s, paper and sheet', (colour, wash) => {
    for (const ground of [wash, ...grounds]) expect(ratio(colour, ground)).toBeGreaterThanOrEqual(4.5);
  });

  test('the words of filled buttons can be read, also while they are disabled', () => {
    expect(ratio('sheet', 'leaf')).toBeGreaterThanOrEqual(4.5);
    expect(ratio('sheet', 'leaf-deep')).toBeGreaterThanOrEqual(4.5);
    expect(ratio('sheet', 'clay')).toBeGreaterThanOrEqual(4.5);
    expect(ratio('ink-soft', 'bark-wash')).toBeGreaterThanOrEqual(4.5);
  });

  test.each(grounds)('borders of controls and the focus stand out from %s by 3 to 1', (ground) => {
    expect(ratio('wire-strong', ground)).toBeGreaterThanOrEqual(3);
    expect(ratio('focus', ground)).toBeGreaterThanOrEqual(3);
  });
});
