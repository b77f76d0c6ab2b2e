import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';

const css = readFileSync(new URL('../../../src/styles/tokens.css', import.meta.url), 'utf8');

function tokensOf(theme: 'light' | 'dark'): ReadonlyMap<string, string> {
  const block = css.split(`[data-theme='${theme}']`)[1]?.split('}')[0] ?? '';
  return new Map(
    [...block.matchAll(/--([\w-]+):\s*(#[0-9a-f]{6})/g)].map(([, name = '', value = '']) => [
      name,
      value,
    ]),
  );
}

/** Relative luminance and contrast ratio as defined by WCAG 2.2. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(first: string, second: string): number {
  const [high = 0, low = 0] = [luminance(first), luminance(second)].sort((a, b) => b - a);
  return (high + 0.05) / (low + 0.05);
}

const words = ['ink', 'ink-2', 'ink-3', 'reed', 'heron', 'marigold-ink', 'brick'] as const;
const onFills = [
  ['on-reed', 'reed'],
  ['on-reed', 'reed-deep'],
  ['on-heron', 'heron'],
  ['on-brick', 'brick'],
  ['ink', 'reed-wash'],
  ['ink', 'heron-wash'],
  ['ink-2', 'reed-wash'],
  ['ink-2', 'shut'],
] as const;

describe.each(['light', 'dark'] as const)('the %s theme', (theme) => {
  const tokens = tokensOf(theme);
  const ratio = (front: string, back: string) =>
    contrast(tokens.get(front) ?? '#000000', tokens.get(back) ?? '#000000');

  test('keeps its words at 4.5 : 1 on paper, sheet and mist (WCAG 2.2, 1.4.3)', () => {
    for (const ground of ['paper', 'sheet', 'mist', 'mist-2']) {
      for (const word of words) {
        expect(ratio(word, ground), `${word} on ${ground}`).toBeGreaterThanOrEqual(4.5);
      }
    }
    for (const [front, back] of onFills) {
      expect(ratio(front, back), `${front} on ${back}`).toBeGreaterThanOrEqual(4.5);
    }
  });

  test('keeps marks and control edges at 3 : 1 (WCAG 2.2, 1.4.11)', () => {
    for (const ground of ['paper', 'sheet', 'mist-2']) {
      for (const shape of ['edge', 'reed', 'heron', 'marigold', 'brick']) {
        expect(ratio(shape, ground), `${shape} on ${ground}`).toBeGreaterThanOrEqual(3);
      }
    }
  });
});
