export const barTones = ['heron', 'reed', 'finished', 'at-risk'] as const;
export type BarTone = (typeof barTones)[number];

export type BarInks = {
  readonly edge: string;
  readonly mid: string;
  readonly solid: string;
  readonly deep: string;
  readonly wash: string;
  readonly number: string;
  readonly door: string;
};

const heron: BarInks = {
  edge: 'var(--heron)',
  mid: 'var(--heron-mid)',
  solid: 'var(--heron)',
  deep: 'var(--heron-deep)',
  wash: 'var(--heron-wash)',
  number: 'var(--on-heron)',
  door: 'var(--ink)',
};

export const barInks: Record<BarTone, BarInks> = {
  heron,
  'at-risk': heron,
  reed: {
    edge: 'var(--reed)',
    mid: 'color-mix(in srgb, var(--reed) 45%, var(--sheet))',
    solid: 'var(--reed)',
    deep: 'var(--reed-deep)',
    wash: 'var(--reed-wash)',
    number: 'var(--on-reed)',
    door: 'var(--ink)',
  },
  finished: {
    edge: 'var(--heron-mid)',
    mid: 'var(--heron-wash)',
    solid: 'var(--heron-mid)',
    deep: 'var(--heron)',
    wash: 'var(--heron-wash)',
    number: 'var(--ink)',
    door: 'var(--rule-2)',
  },
};
