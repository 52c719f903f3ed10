import type { Finding, RuleCode } from './findings.ts';
import type { Rule } from './rule.ts';
import { rules as shippedRules } from './rules/shipped.ts';
import { answerWords } from './words.ts';

type Values = Finding['values'];

type Explanation = {
  /** A few words for the queue: "Fall onto the arm; pain 8, usual 3". */
  title: string;
  /** The day, the pain beside the person's own usual where the title does not say it, and what the rule looks for. */
  sentence: string;
  source: string;
  ruleVersion: number;
};

const inWords = (code: string): string => answerWords[code] ?? code;

const list = (value: Values[string] | undefined): string =>
  typeof value === 'string'
    ? value
        .split(', ')
        .filter((code) => code !== '')
        .map(inWords)
        .join(', ')
    : '';

const withList = (head: string, values: Values): string => {
  const signs = list(values.signs);
  return signs === '' ? head : `${head}; ${signs}`;
};

/** "pain 8, usual 3"; the usual is rounded for show. */
const pain = ({ painNow, usual }: Values): string => {
  if (typeof painNow !== 'number') return '';
  return typeof usual === 'number' ? `pain ${painNow}, usual ${Math.round(usual)}` : `pain ${painNow}`;
};

const withPain = (head: string, values: Values): string =>
  pain(values) === '' ? head : `${head}; ${pain(values)}`;

const temperature = ({ temperatureTenths: tenths, temperatureUnit: unit }: Values): string =>
  typeof tenths === 'number' && typeof unit === 'string'
    ? `${(tenths / 10).toFixed(1)} °${unit}`
    : 'felt, not measured';

const fallWords = (values: Values): string => (values.onArm === true ? 'Fall onto the arm' : 'Fall');

const popOrShape = (values: Values): string =>
  [values.pop === true ? 'Pop or slip' : '', values.changedShape === true ? 'Changed shape' : '']
    .filter((part) => part !== '')
    .join(', ');

const chestWords = ({ chest, fainted }: Values): string => {
  const parts = [
    typeof chest === 'string' ? `Chest pain or trouble breathing, ${inWords(chest)}` : '',
    typeof fainted === 'string' ? `Fainted or coughed up blood, ${inWords(fainted)}` : '',
  ];
  return parts.filter((part) => part !== '').join('; ');
};

const headWords = (values: Values): string => {
  const blow = values.knockedOut === true ? 'Fall, knocked out' : 'Fall with a blow to the head';
  if (values.bloodThinner === true) return `${blow}; takes a blood thinner`;
  return values.bloodThinner === null ? `${blow}; blood thinner not recorded` : blow;
};

const woundWords = (values: Values): string => {
  const fluid = [values.colour, values.thickness]
    .filter((value) => typeof value === 'string')
    .map((code) => (code === 'not-sure' ? 'not sure' : code));
  const signs = typeof values.signs === 'string' ? values.signs.split(', ') : [];
  const head = signs.includes('pus')
    ? `Wound fluid, color ${fluid[0] ?? ''}, thickness ${fluid[1] ?? ''}`
    : 'Wound opened';
  const beside = signs.filter(
    (sign) => sign !== 'pus' && !(sign === 'wound-opened' && head === 'Wound opened'),
  );
  return beside.length > 0 ? `${head}; ${beside.map(inWords).join(', ')}` : head;
};

const titles: Record<RuleCode, (values: Values) => string> = {
  'chest-or-breathing': chestWords,
  'stroke-or-confusion': () => 'New confusion, drooping face, weak side or slurred speech',
  circulation: () => 'Hand cold, pale or blue',
  sedation: () => 'Hard to wake, or slow breathing',
  allergy: () => 'Swelling of face or throat',
  bleeding: () => 'Bleeding that does not stop, blood vomited or black stool',
  compartment: (values) => withList('Tight forearm', values),
  'possible-sepsis': (values) => `Fever ${temperature(values)}, shaking and faint`,
  'head-injury': headWords,
  'dislocation-with-nerve': (values) => withList(popOrShape(values), values),
  'self-harm': (values) =>
    values.selfHarm === 'yes' ? 'Thoughts of self-harm' : 'Thoughts of self-harm: not sure',
  dislocation: (values) =>
    values.pop === true ? withList(popOrShape(values), values) : 'Shoulder changed shape',
  'fall-with-injury': (values) => {
    const head = withPain(fallWords(values), values);
    const signs = typeof values.signs === 'string' ? values.signs.split(', ') : [];
    const beside = signs.filter((sign) => sign !== 'pain-up' || pain(values) === '');
    return beside.length > 0 ? `${head}; ${beside.map(inWords).join(', ')}` : head;
  },
  'fever-high': (values) => `Fever ${temperature(values)}`,
  'wound-pus': woundWords,
  'hand-weakness': () => 'New weakness of the hand',
  'clot-arm': (values) => withList('Whole arm swollen', values),
  'clot-leg': () => 'One calf sore and swollen',
  'pain-uncontrolled': ({ painWorst, medicine }) =>
    `Worst pain ${String(painWorst)}, ${medicine === 'no' ? 'medicine does not help' : 'not sure that medicine helps'}`,
  fluids: () => 'Cannot keep fluids down',
  water: () => 'Cannot pass water',
  'pop-alone': () => 'Pop or slip, nothing else',
  fall: (values) =>
    withPain(values.hitHead === true ? `${fallWords(values)}, hit the head` : fallWords(values), values),
  fever: (values) => `Fever ${temperature(values)}`,
  'pain-severe': (values) => withPain('Severe pain', values),
  'pain-rise': (values) => {
    const rise =
      typeof values.painNow === 'number' && typeof values.usual === 'number'
        ? Math.round((values.painNow - values.usual) * 10) / 10
        : null;
    return `Pain ${String(values.painNow)}, up ${String(rise)} on the mean of the last 3`;
  },
  unclassified: (values) => `Reported: ${list(values.signs)}`,
};

const besideUsual = ({ painNow, usual }: Values): string => {
  if (typeof painNow !== 'number') return '';
  return typeof usual === 'number'
    ? `Pain now ${painNow}, usual ${Math.round(usual)}.`
    : `Pain now ${painNow}, no earlier check-in to compare.`;
};

/** A finding in words for clinicians. The words of a rule that is no longer known are its code. */
export const explain = (finding: Finding, rules: readonly Rule[] = shippedRules): Explanation => {
  const rule = rules.find(({ code }) => code === finding.code);
  const title = titles[finding.code](finding.values);
  return {
    title,
    sentence: [
      `Day ${String(finding.values.day)}.`,
      title.includes('usual') ? '' : besideUsual(finding.values),
      rule?.clinicianText ?? '',
    ]
      .filter((part) => part !== '')
      .join(' '),
    source: rule?.source ?? '',
    ruleVersion: finding.ruleVersion,
  };
};
