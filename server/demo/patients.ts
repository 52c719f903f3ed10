import type { StaffKey } from './staff.ts';
import { idOf } from './random.ts';

export type DemoPatient = {
  /** It names them here as well: ids and histories follow from it. */
  name: string;
  email: string;
  /** The day after surgery on the day that the demo is filled. */
  day: number;
  arm: 'left' | 'right';
  age: number;
  lead: StaffKey & ('noor' | 'callum');
  hasAccount: boolean;
  /** Its name; 'none' when asked and none is taken; null where nobody has recorded it. */
  bloodThinner: string | null;
  allergies: string | null;
};

type Lead = DemoPatient['lead'];
type Line = [name: string, day: number, arm: 'L' | 'R', age: number, lead: Lead, thinner?: string | null];

/** The people of the scenario. They have accounts. */
const named: readonly Line[] = [
  ['Ines Valcourt', 24, 'L', 68, 'noor', 'none'],
  ['Tobias Ahlgren', 31, 'R', 74, 'noor', 'apixaban'],
  ['Wendell Pryce', 9, 'R', 77, 'noor', 'none'],
  ['Rukmini Dass', 58, 'L', 61, 'callum', 'none'],
  ['Hal Brandvold', 12, 'R', 70, 'noor', 'aspirin'],
  ['Gwen Thackeray', 40, 'R', 72, 'callum', null],
  ['Marguerite Oyelaran', 19, 'R', 66, 'noor', 'none'],
  ['Soledad Quiroga', 96, 'L', 79, 'noor', 'warfarin'],
];

/** Others of whom something is told: one before surgery, one away, one whom the clinic no longer watches. */
const inOtherStates: readonly Line[] = [
  ['Rosalind Achebe-Lind', -6, 'R', 67, 'noor', 'none'],
  ['Ignatius Papadimitriou', 26, 'R', 71, 'noor', null],
  ['Desmond Achterberg', 118, 'L', 73, 'callum', 'rivaroxaban'],
];

/** The rest of the caseload, all invented, with names as long and as written as names are. */
const others: readonly Line[] = [
  ['Anselm Okwuosa', 71, 'R', 69, 'callum', 'none'],
  ['Birgit Falk', 3, 'L', 75, 'noor', 'none'],
  ['Yewande Castellanos', 47, 'R', 64, 'noor', 'none'],
  ['Þórunn Guðmundsdóttir', 15, 'L', 71, 'callum', 'none'],
  ['Leocadia Wolańska-Brzęczyszczykiewicz', 17, 'R', 76, 'noor', 'aspirin'],
  ['Nguyễn Thị Lan Hương', 21, 'L', 67, 'callum', 'none'],
  ['José Ángel Etxeberria Mendizábal', 33, 'R', 70, 'noor', 'none'],
  ['Anahit Ter-Hovhannisyan', 5, 'R', 63, 'callum', null],
  ['Kamalakshi Venkatasubramanian', 27, 'L', 80, 'noor', 'apixaban'],
  ['Zdeněk Hřebíček', 46, 'L', 72, 'callum', 'none'],
  ['Bartholomew Featherstonehaugh-Pemberton', 62, 'R', 82, 'noor', 'warfarin'],
  ['Mele Tupouniua', 38, 'R', 60, 'noor', 'none'],
  ['Ingeborg Sørlie', 77, 'L', 78, 'callum', 'none'],
  ['Ilse Dörflinger', 1, 'R', 69, 'noor', 'none'],
  ['Farid Benyamina', 2, 'L', 65, 'callum', 'none'],
  ['Chidinma Ezeaku', 4, 'L', 62, 'noor', null],
  ['Oskar Tällberg', 6, 'R', 74, 'callum', 'none'],
  ['Dolores Etcheverry', 7, 'L', 81, 'noor', 'aspirin'],
  ['Takumi Hoshizaki', 8, 'R', 68, 'callum', 'none'],
  ['Ruth Abramowicz', 10, 'L', 84, 'noor', 'apixaban'],
  ['Siobhán Mac Giolla Bhríde', 11, 'R', 66, 'callum', 'none'],
  ['Lindiwe Mthembu', 13, 'L', 59, 'noor', 'none'],
  ['Casimir Dobrowolski', 14, 'R', 73, 'callum', 'none'],
  ['Fatoumata Diallo-Keïta', 16, 'R', 70, 'noor', 'none'],
  ['Eun-ji Bangwool', 18, 'L', 61, 'callum', 'none'],
  ['Haruto Shirakawa', 20, 'R', 85, 'noor', 'clopidogrel'],
  ['Margarethe Überreiter', 22, 'L', 77, 'callum', 'none'],
  ['Parvaneh Golestani', 29, 'L', 64, 'callum', 'none'],
  ['Lucjan Żółkiewski', 35, 'R', 79, 'noor', 'rivaroxaban'],
  ['Consolata Wanjiru', 43, 'L', 67, 'noor', 'none'],
  ['Émile Grandmaison', 50, 'R', 75, 'callum', 'none'],
  ['Vaiola Fonoimoana', 53, 'L', 58, 'noor', 'none'],
  ['Bronwen Llewellyn-Hughes', 57, 'R', 72, 'callum', 'none'],
  ['Arjun Bhattacharyya', 65, 'L', 69, 'noor', 'none'],
  ['Nkechi Amadi-Osei', 69, 'R', 63, 'callum', 'none'],
  ['Salvatore Cacciaguerra', 75, 'L', 83, 'noor', 'warfarin'],
  ['Tove Ångström-Lie', 83, 'R', 70, 'callum', 'none'],
  ['Ximena Ñancupil', 88, 'L', 65, 'noor', 'none'],
  ['Gerhardt Weißenbacher', 103, 'R', 86, 'callum', 'apixaban'],
  ['Apolonia Kvasničková', 112, 'L', 74, 'noor', 'none'],
];

/** Letters that no accent can be taken off. */
const plainLetters: Record<string, string> = { þ: 'th', ð: 'd', ł: 'l', ø: 'o', ß: 'ss', đ: 'd' };

const plain = (word: string): string =>
  word
    .toLowerCase()
    .normalize('NFD')
    .replace(/\p{Mark}/gu, '')
    .replace(/[þðłøßđ]/g, (letter) => plainLetters[letter] ?? letter)
    .replace(/[^a-z]/g, '');

const allergies: Record<string, string> = {
  Ines: 'Penicillin',
  Wendell: 'None known',
  Tobias: 'None known',
  Hal: 'Adhesive tape',
  Rukmini: 'Sulfa medicines',
  Ruth: 'Codeine',
  Lucjan: 'Latex',
};

const toPatient = ([name, day, arm, age, lead, thinner = null]: Line, hasAccount: boolean): DemoPatient => {
  const [first = name, ...rest] = name.split(' ');
  return {
    name,
    email: `${plain(first)}@${plain(rest.at(-1) ?? first)}.example`,
    day,
    arm: arm === 'L' ? 'left' : 'right',
    age,
    lead,
    hasAccount,
    bloodThinner: thinner,
    allergies: allergies[first] ?? (age % 3 === 0 ? null : 'None known'),
  };
};

export const patientsOfDemo: readonly DemoPatient[] = [
  ...named.map((line) => toPatient(line, true)),
  ...inOtherStates.map((line) => toPatient(line, true)),
  ...others.map((line) => toPatient(line, false)),
];

export const patientIdOf = (name: string): string => idOf('patient', name);
export const personIdOf = (name: string): string => idOf('person', name);
