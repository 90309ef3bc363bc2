import type { Config } from 'tailwindcss';

/** The values stand in app/globals.css as variables, light and dark. */
const token = (name: string) => `var(--${name})`;

export default {
  content: [],
  theme: {
    extend: {
      colors: {
        paper: token('paper'),
        surface: token('surface'),
        raised: token('raised'),
        ink: token('ink'),
        quiet: token('quiet'),
        rule: token('rule'),
        edge: token('edge'),
        indigo: token('indigo'),
        'indigo-fill': token('indigo-fill'),
        'indigo-wash': token('indigo-wash'),
        'on-indigo': token('on-indigo'),
        madder: token('madder'),
        'madder-wash': token('madder-wash'),
        weld: token('weld'),
        'on-weld': token('on-weld'),
        verdigris: token('verdigris'),
        'verdigris-wash': token('verdigris-wash'),
      },
      fontFamily: {
        sans: ['var(--font-sans)', 'sans-serif'],
        mono: ['var(--font-mono)', 'monospace'],
      },
      borderRadius: { DEFAULT: '4px' },
    },
  },
} satisfies Config;
