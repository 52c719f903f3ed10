import { expect, it } from 'vitest';
import { matchesSearch } from '#shared/patients/search.ts';

const found = (name: string, search: string) => matchesSearch({ name, chartNumber: 'OL-1042' }, search);

it('finds by the beginning of any part of the name, in any order, and not by its middle', () => {
  const name = 'Leocadia Wolańska-Brzęczyszczykiewicz';
  expect(found(name, 'wol')).toBe(true);
  expect(found(name, 'brz leo')).toBe(true);
  expect(found(name, 'wolanska-brz')).toBe(true);
  expect(found(name, 'anska')).toBe(false);
  expect(found(name, 'leo smith')).toBe(false);
});

it('finds letters that a keyboard lacks, with and without their accents', () => {
  const name = 'Þórunn Guðmundsdóttir';
  expect(found(name, 'thorunn gudm')).toBe(true);
  expect(found(name, 'ÞÓR')).toBe(true);
  // An accent as a sign of its own behind the letter (Unicode, form D) is the same letter.
  expect(found('Zoë Zapata', 'Zoe\u0308')).toBe(true);
  expect(found('Søren Łukasz Strauß', 'soren luk strauss')).toBe(true);
});

it('finds by the beginning of the chart number, and not by its middle', () => {
  expect(found('Tobias Ahlgren', 'ol-10')).toBe(true);
  expect(found('Tobias Ahlgren', '1042')).toBe(false);
});

it('shows everybody to an empty search, and nobody to one without a letter or a number', () => {
  expect(found('Tobias Ahlgren', '   ')).toBe(true);
  expect(found('Tobias Ahlgren', '?')).toBe(false);
});
