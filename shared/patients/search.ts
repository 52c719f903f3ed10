/** Letters that no accent can be taken off. */
const plainLetters: Record<string, string> = {
  þ: 'th',
  ð: 'd',
  đ: 'd',
  ł: 'l',
  ø: 'o',
  ß: 'ss',
  æ: 'ae',
  œ: 'oe',
  ı: 'i',
};

/** Without accents and capitals: what is typed on a keyboard that lacks the letters finds the name all the same. */
export const plainText = (text: string): string =>
  text
    .toLowerCase()
    .normalize('NFD')
    .replace(/\p{Mark}/gu, '')
    .replace(/[þðđłøßæœı]/gu, (letter) => plainLetters[letter] ?? letter);

const partsOf = (text: string): string[] =>
  plainText(text)
    .split(/[^\p{Letter}\p{Number}]+/u)
    .filter(Boolean);

/** Every word of the search begins a part of the name, or all of it begins the chart number. */
export const matchesSearch = (patient: { name: string; chartNumber: string }, search: string): boolean => {
  const wanted = plainText(search.trim());
  if (wanted === '' || plainText(patient.chartNumber).startsWith(wanted)) return true;
  const words = partsOf(search);
  const parts = partsOf(patient.name);
  return words.length > 0 && words.every((word) => parts.some((part) => part.startsWith(word)));
};
