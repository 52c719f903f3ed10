import type { Config } from 'tailwindcss';
import plugin from 'tailwindcss/plugin';

/** The design tokens of the light theme. Names say the role, never the place of use. */
export const lightTokens = {
  /** Page ground. */
  paper: '#fbf8f1',
  /** Raised surface, and the text on filled leaf and clay. */
  sheet: '#ffffff',
  /** Hairlines and dividers: decoration only, below 3:1. */
  wire: '#dcd4c3',
  /** Borders of controls, 3:1 on paper and sheet. */
  'wire-strong': '#8d8674',
  ink: '#1e2a22',
  /** Secondary text, at least 4.5:1 on every ground. */
  'ink-soft': '#55604f',
  leaf: '#2c6a4b',
  'leaf-deep': '#1c4833',
  'leaf-wash': '#e3eee3',
  bark: '#6a4b35',
  'bark-wash': '#efe6dc',
  clay: '#a4361f',
  'clay-wash': '#f9e3dc',
  ochre: '#865700',
  'ochre-wash': '#f8ebcb',
  slate: '#2f5573',
  'slate-wash': '#e0eaf2',
  moss: '#4f6b34',
  'moss-wash': '#e9efdd',
  focus: '#14509e',
};

type TokenName = keyof typeof lightTokens;
type Tokens = Record<TokenName, string>;

/** The same roles in the dark. */
export const darkTokens: Tokens = {
  paper: '#131915',
  sheet: '#1b231d',
  wire: '#35403a',
  'wire-strong': '#7d8a7f',
  ink: '#eef0e8',
  'ink-soft': '#b4bdb0',
  leaf: '#7ec79e',
  'leaf-deep': '#a5dcbd',
  'leaf-wash': '#203329',
  bark: '#b99878',
  'bark-wash': '#2c251f',
  clay: '#f08d76',
  'clay-wash': '#3c1f18',
  ochre: '#e3b04b',
  'ochre-wash': '#362a12',
  slate: '#8fbbe0',
  'slate-wash': '#1b2b38',
  moss: '#a9c585',
  'moss-wash': '#263020',
  focus: '#8ab8ff',
};

function asVariables(tokens: Tokens, colorScheme: 'light' | 'dark') {
  const variables = Object.entries(tokens).map(([name, value]) => [`--${name}`, value]);
  return { ...Object.fromEntries(variables), 'color-scheme': colorScheme } as Record<string, string>;
}

const colorNames = Object.keys(lightTokens) as TokenName[];

const config: Config = {
  content: [],
  theme: {
    // The palette of the framework is replaced whole, so that no colour without a dark twin can be used.
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(colorNames.map((name) => [name, `var(--${name})`])),
    },
    fontFamily: { sans: ['Lato', 'system-ui', 'sans-serif'], mono: ['ui-monospace', 'monospace'] },
    borderRadius: { none: '0', sm: '4px', DEFAULT: '6px', full: '9999px' },
    extend: {
      // The least height of a thing to press; `app.css` makes it larger where the base size is larger.
      spacing: { target: 'var(--target)' },
    },
  },
  plugins: [
    plugin((api) => {
      // Paper is always printed on light ground, so the dark theme exists on screens only.
      api.addBase({
        ':root': asVariables(lightTokens, 'light'),
        '@media screen': {
          '@media (prefers-color-scheme: dark)': {
            ':root:not([data-theme="light"])': asVariables(darkTokens, 'dark'),
          },
          ':root[data-theme="dark"]': asVariables(darkTokens, 'dark'),
        },
      });
    }),
  ],
};

export default config;
