import type { Config } from 'tailwindcss';

const colourNames = [
  'paper',
  'sheet',
  'mist',
  'mist-2',
  'ink',
  'ink-2',
  'ink-3',
  'rule',
  'rule-2',
  'edge',
  'reed',
  'reed-deep',
  'reed-wash',
  'heron',
  'heron-deep',
  'heron-mid',
  'heron-wash',
  'marigold',
  'marigold-ink',
  'marigold-wash',
  'brick',
  'brick-deep',
  'brick-wash',
  'on-reed',
  'on-heron',
  'on-brick',
  'hatch',
  'shut',
] as const;

const colours = Object.fromEntries(colourNames.map((name) => [name, `var(--${name})`]));

/** Utilities speak in the tokens' names only; a colour outside `tokens.css` does not exist. */
export default {
  content: [],
  theme: {
    colors: { ...colours, transparent: 'transparent', current: 'currentColor' },
    fontFamily: { sans: 'var(--sans)', mono: 'var(--mono)' },
    fontSize: {
      note: ['var(--t-note)', 'var(--l-note)'],
      table: ['var(--t-table)', 'var(--l-table)'],
      body: ['var(--t-body)', 'var(--l-body)'],
      head: ['var(--t-head)', 'var(--l-head)'],
      title: ['var(--t-title)', 'var(--l-title)'],
      figure: ['var(--t-figure)', 'var(--l-figure)'],
      phone: ['var(--t-phone)', 'var(--l-phone)'],
    },
    borderRadius: { none: '0', 1: 'var(--r1)', 2: 'var(--r2)' },
    boxShadow: { slip: 'var(--slip-shadow)', none: 'none' },
    extend: {
      spacing: {
        'margin-col': 'var(--margin-col)',
        'page-x': 'var(--page-x)',
        row: 'var(--row)',
        'row-board': 'var(--row-board)',
        'row-tide': 'var(--row-tide)',
        control: 'var(--control)',
      },
      screens: { phone: { max: '720px' } },
    },
  },
} satisfies Config;
