import { expect, test } from 'vitest';
import words from '#src/locales/en/accounts.json' with { type: 'json' };
import { readingGrade } from '../../shared/reading-grade.ts';

type Node = string | { [key: string]: Node };

const textsIn = (node: Node): string[] =>
  typeof node === 'string' ? [node] : Object.values(node).flatMap(textsIn);

/** Labels end without a stop; as a sentence of its own each counts for what it is. */
const asProse = (texts: readonly string[]): string =>
  texts.map((text) => (/[.?!:]$/.test(text) ? text : `${text}.`)).join(' ');

const { ...tree } = words as Record<string, Node>;
const ofSignIn = Object.values(tree).filter((node) => typeof node === 'string');
const screens = Object.entries(tree).filter(([, node]) => typeof node !== 'string');

// interface.md, "Words": reading grade 6 or lower per screen of text.
test.each([...screens, ['sign-in', ofSignIn.join(' ')] as [string, Node]])(
  'the words of %s can be read at grade 6',
  (_, node) => {
    expect(readingGrade(asProse(textsIn(node)))).toBeLessThanOrEqual(6);
  },
);
