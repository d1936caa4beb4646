import type { Config } from 'tailwindcss';

/** Every colour is a token of the design: no other colour utility exists. */
const tokens = [
  ...['page', 'well', 'surface', 'rule', 'rule2', 'ink', 'ink2', 'ink3'],
  ...['act', 'act-soft', 'bound', 'bound-soft', 'data', 'data-soft'],
  ...['ok', 'ok-soft', 'warn', 'warn-soft', 'bad', 'bad-soft'],
  ...['s1', 's2', 's3', 's4', 's5'],
  ...['plate', 'plate-2', 'p-ink', 'p-ink2', 'p-ink3', 'p-rule', 'p-bound', 'p-data'],
];

export default {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(tokens.map((token) => [token, `var(--${token})`])),
    },
    fontFamily: { sans: ['"Source Sans 3"', 'sans-serif'] },
    fontSize: {
      fine: ['12px', '1.35'],
      chart: ['13px', '1.35'],
      note: ['14px', '1.4'],
      body: ['15px', '1.45'],
      value: ['17px', '1.3'],
      section: ['19px', '1.2'],
      figure: ['24px', '1.15'],
      statement: ['27px', '1.34'],
      title: ['34px', '1.12'],
    },
    borderRadius: { none: '0', DEFAULT: '3px', plate: '4px', full: '9999px' },
    boxShadow: { none: 'none' },
  },
} satisfies Config;
