import { ZxcvbnFactory, type ZxcvbnResult } from '@zxcvbn-ts/core';
import { adjacencyGraphs, dictionary } from '@zxcvbn-ts/language-common';
import { Problem } from '#shared/problems/problems.ts';

/** Lists of leaked passwords and common words, and the rows of keyboards. Few exchanges of letters, for speed. */
const estimator = new ZxcvbnFactory({ dictionary, graphs: adjacencyGraphs, l33tMaxSubstitutions: 8 });

/** A guesser who knows the lists needs fewer tries than this: zxcvbn's border between "good" and "strong". */
const fewestGuesses = 1e10;
/** What is left of a password without one's own words must be at least this long. */
const fewestOwnCharacters = 8;

const productName = 'espalier';
const advice =
  'A few words in a row that have nothing to do with each other are strong and easy to remember.';

const reasons = {
  own: 'That is made of your name, your e-mail address or the name of this product.',
  repeat: 'That repeats the same few characters.',
  row: 'That follows the alphabet, the numbers or the keys of a keyboard.',
  common: 'That is made of passwords that many people use, and those are tried first.',
  date: 'That is made of a date, and dates are tried first.',
} as const;
type Reason = keyof typeof reasons;

type Owner = { name: string; email: string };

/** The words that whoever knows this person would try first. */
const ownWords = ({ name, email }: Owner): string[] => {
  const [local = '', domain = ''] = email.split('@');
  const words = [name, email, local, domain, ...`${name} ${local} ${domain}`.split(/[^\p{L}\p{N}]+/u)];
  return [productName, ...words]
    .map((word) => word.normalize('NFC').toLowerCase())
    .filter((word) => word.length >= 3)
    .toSorted((a, b) => b.length - a.length);
};

const isMostlyOwn = (password: string, own: readonly string[]): boolean => {
  const lower = password.toLowerCase();
  const rest = own.reduce((text, word) => text.replaceAll(word, ' '), lower);
  if (rest === lower) return false;
  return rest.replace(/[^\p{L}\p{N}]/gu, '').length < fewestOwnCharacters;
};

const reasonOf = ({ pattern, dictionaryName }: ZxcvbnResult['sequence'][number]): Reason => {
  if (pattern === 'repeat') return 'repeat';
  if (pattern === 'sequence' || pattern === 'spatial') return 'row';
  if (pattern === 'date' || pattern === 'regex') return 'date';
  return dictionaryName === 'userInputs' ? 'own' : 'common';
};

/** What most of the password is made of. */
const mainReason = ({ sequence }: ZxcvbnResult): Reason => {
  const lengths = new Map<Reason, number>();
  for (const match of sequence) {
    if (match.pattern === 'bruteforce' || match.pattern === 'separator') continue;
    const reason = reasonOf(match);
    lengths.set(reason, (lengths.get(reason) ?? 0) + match.token.length);
  }
  const [longest] = [...lengths].toSorted(([, a], [, b]) => b - a);
  return longest?.[0] ?? 'common';
};

/** Held up as examples for so long that guessers begin with them; no list of leaked passwords has them. */
const examples = ['correct horse battery staple'];
const plain = (text: string): string => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');

const whyCommon = (password: string, own: string[]): Reason | null => {
  if (examples.some((one) => plain(one) === plain(password))) return 'common';
  if (isMostlyOwn(password, own)) return 'own';
  const result = estimator.check(password, own);
  return result.guesses < fewestGuesses ? mainReason(result) : null;
};

/**
 * Refuses what is tried first, and says why. Length is the contract's to check; nothing is asked of which kinds
 * of characters there are, since such rules make passwords that are alike (NIST SP 800-63B, 3.1.1.2).
 */
export const refuseCommonPassword = (password: string, owner: Owner): void => {
  const reason = whyCommon(password.normalize('NFC'), ownWords(owner));
  if (reason === null) return;
  const message = `${reasons[reason]} ${advice}`;
  throw new Problem('invalid-input', undefined, { errors: [{ field: 'password', message }] });
};
