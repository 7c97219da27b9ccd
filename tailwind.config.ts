import type { Config } from 'tailwindcss';
import type { PluginAPI } from 'tailwindcss/plugin';

/**
 * Colour tokens as `#rrggbb`, one family for each theme. Every pair that is used as text on ground or as a
 * boundary is listed in `textPairs` and `shapePairs`, which a unit test holds to WCAG 2.2 (1.4.3, 1.4.11).
 */
export const colours = {
  light: {
    paper: '#f7f5f0',
    sheet: '#fefdfa',
    sunk: '#efece4',
    ink: '#1d2321',
    slate: '#56616b',
    rule: '#d9d4c7',
    edge: '#857f70',
    verdigris: '#1f6f66',
    'verdigris-deep': '#175850',
    'verdigris-wash': '#e6f0ed',
    'on-verdigris': '#ffffff',
    madder: '#a2352b',
    'madder-deep': '#85291f',
    'madder-wash': '#f8eae6',
    'on-madder': '#ffffff',
    ochre: '#a86b12',
    'ochre-ink': '#875508',
    'ochre-wash': '#f7eedb',
    focus: '#1f6f66',
    veil: '#1d2321',
  },
  dark: {
    paper: '#141918',
    sheet: '#1b2220',
    sunk: '#101413',
    ink: '#ece8de',
    slate: '#a5b0b4',
    rule: '#35403d',
    edge: '#78857f',
    verdigris: '#74c5b8',
    'verdigris-deep': '#93d8cc',
    'verdigris-wash': '#1c332f',
    'on-verdigris': '#0d1a18',
    madder: '#ef9184',
    'madder-deep': '#f6aca2',
    'madder-wash': '#3a221e',
    'on-madder': '#21100d',
    ochre: '#dda549',
    'ochre-ink': '#e3b263',
    'ochre-wash': '#352a17',
    focus: '#74c5b8',
    veil: '#060908',
  },
} as const;

export type ColourToken = keyof (typeof colours)['light'];

/** Text on ground, at least 4.5:1 in both themes. */
export const textPairs: readonly (readonly [text: ColourToken, ground: ColourToken])[] = [
  ...(['ink', 'slate', 'verdigris', 'madder', 'ochre-ink'] as const).flatMap((text) =>
    (['paper', 'sheet', 'sunk'] as const).map((ground) => [text, ground] as const),
  ),
  ...(['verdigris-wash', 'madder-wash', 'ochre-wash'] as const).flatMap((ground) =>
    (['ink', 'slate'] as const).map((text) => [text, ground] as const),
  ),
  ['verdigris', 'verdigris-wash'],
  ['madder', 'madder-wash'],
  ['ochre-ink', 'ochre-wash'],
  ['on-verdigris', 'verdigris'],
  ['on-verdigris', 'verdigris-deep'],
  ['on-madder', 'madder'],
  ['on-madder', 'madder-deep'],
  ['paper', 'ink'],
];

/** Boundaries of controls, focus rings and state shapes on ground, at least 3:1 in both themes. */
export const shapePairs: readonly (readonly [shape: ColourToken, ground: ColourToken])[] = [
  ...(['edge', 'focus', 'verdigris', 'madder', 'ochre', 'ink'] as const).flatMap((shape) =>
    (['paper', 'sheet', 'sunk'] as const).map((ground) => [shape, ground] as const),
  ),
  ['focus', 'verdigris-wash'],
  ['ochre', 'ochre-wash'],
];

function asVariables(family: Record<string, string>): Record<string, string> {
  return Object.fromEntries(Object.entries(family).map(([name, value]) => [`--${name}`, value]));
}

/** System theme unless `<html data-theme>` says otherwise; no script has a part in it. */
function themes({ addBase }: PluginAPI): void {
  const light = { ...asVariables(colours.light), 'color-scheme': 'light' };
  const dark = { ...asVariables(colours.dark), 'color-scheme': 'dark' };
  addBase({
    ':root': light,
    '@media (prefers-color-scheme: dark)': { ':root:not([data-theme="light"])': dark },
    ':root[data-theme="dark"]': dark,
  });
}

const config: Config = {
  content: ['./app/**/*.{ts,tsx}'],
  darkMode: ['selector', ':root[data-theme="dark"] &'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(Object.keys(colours.light).map((name) => [name, `var(--${name})`])),
    },
    fontFamily: {
      sans: ['var(--font-text-ext)', 'var(--font-text)', 'system-ui', 'sans-serif'],
      mono: ['var(--font-figure)', 'ui-monospace', 'monospace'],
    },
    fontSize: {
      label: ['0.6875rem', { lineHeight: '1rem', letterSpacing: '0.07em' }],
      xs: ['0.75rem', { lineHeight: '1.125rem' }],
      sm: ['0.8125rem', { lineHeight: '1.25rem' }],
      base: ['0.9375rem', { lineHeight: '1.4375rem' }],
      md: ['1rem', { lineHeight: '1.5rem' }],
      lg: ['1.125rem', { lineHeight: '1.5rem', letterSpacing: '-0.005em' }],
      xl: ['1.375rem', { lineHeight: '1.75rem', letterSpacing: '-0.01em' }],
      '2xl': ['1.75rem', { lineHeight: '2.125rem', letterSpacing: '-0.015em' }],
      '3xl': ['2.5rem', { lineHeight: '2.75rem', letterSpacing: '-0.025em' }],
    },
    borderRadius: { none: '0', DEFAULT: '2px', sm: '1px', full: '9999px' },
    extend: {
      maxWidth: { prose: '62ch', page: '90rem' },
      boxShadow: { lift: '0 1px 0 var(--rule), 0 10px 28px -12px rgb(0 0 0 / 0.35)' },
    },
  },
  plugins: [themes],
};

export default config;
