const length = 10;
const group = 5;
/** Letters that a code never holds, since they are read as others: what they are taken for instead. */
const readAs: Readonly<Record<string, string>> = { O: '0', I: '1', L: '1', U: 'V' };

type LetterCode = { code: string } | { wrong: 'length'; typed: number } | { wrong: 'characters' };

/** The code of a letter, however it was typed: small letters, spaces, hyphens, and letters mistaken for digits. */
export function readLetterCode(text: string): LetterCode {
  const plain = text
    .normalize('NFKC')
    .toUpperCase()
    .replace(/[\s\p{Pd}._]/gu, '');
  if (/[^0-9A-Z]/.test(plain)) return { wrong: 'characters' };
  if (plain.length !== length) return { wrong: 'length', typed: plain.length };
  const code = [...plain].map((letter) => readAs[letter] ?? letter).join('');
  return { code: `${code.slice(0, group)}-${code.slice(group)}` };
}
