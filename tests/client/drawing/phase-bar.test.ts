import { describe, expect, test } from 'vitest';
import {
  hourTicks,
  layOutPhases,
  placeBarWords,
  placeCaptions,
  type BarPhase,
} from '#src/components/drawing/phase-bar.view.ts';

const slot: readonly BarPhase[] = [
  { phase: 'connect', seconds: 600 },
  { phase: 'ramp', seconds: 0 },
  { phase: 'soak', seconds: 1200 },
  { phase: 'hold', seconds: 3600 },
  { phase: 'measure', seconds: 3600 },
  { phase: 'hold', seconds: 600, margin: true },
  { phase: 'unload', seconds: 600 },
];

describe('a booking laid out over a width', () => {
  test('parts are true to their lengths, touch, and fill the width', () => {
    const parts = layOutPhases(slot, 102);
    expect(parts.map((part) => part.part)).toEqual([
      'connect',
      'soak',
      'hold',
      'measure',
      'margin',
      'unload',
    ]);
    expect(parts.map((part) => part.width)).toEqual([6, 12, 36, 36, 6, 6]);
    expect(parts.map((part) => part.x)).toEqual([0, 6, 18, 54, 90, 96]);
  });

  test('a phase too short to see keeps one pixel, taken from the longest', () => {
    const parts = layOutPhases(
      [
        { phase: 'connect', seconds: 60 },
        { phase: 'hold', seconds: 35_940 },
      ],
      100,
    );
    expect(parts.map((part) => part.width)).toEqual([1, 99]);
  });

  test('nothing to draw gives no parts', () => {
    expect(layOutPhases([{ phase: 'hold', seconds: 0 }], 100)).toEqual([]);
    expect(layOutPhases(slot, 0)).toEqual([]);
  });
});

describe('words in and under a bar', () => {
  test('the number stands in the solid part, the cells only where there is room', () => {
    const wide = layOutPhases(slot, 408);
    expect(placeBarWords(wide, '2418', '3 × LF280, settled')).toEqual({
      x: 77,
      number: '2418',
      words: '3 × LF280, settled',
    });
    const middle = layOutPhases(slot, 102);
    expect(placeBarWords(middle, '2418', '3 × LF280, settled')?.words).toBe('');
  });

  test('a number that does not fit is left out', () => {
    expect(placeBarWords(layOutPhases(slot, 40), '2418', '')).toBeUndefined();
  });

  test('captions never overlap and the longest parts keep theirs', () => {
    const parts = layOutPhases(slot, 204);
    const captions = placeCaptions(parts, 204, (part) => part);
    const ends = captions.map((caption) => caption.x + caption.part.length * 5.9);
    captions.slice(1).forEach((caption, index) => {
      expect(caption.x).toBeGreaterThanOrEqual((ends[index] ?? Infinity) + 6);
    });
    expect(captions.map((caption) => caption.part)).toEqual(
      expect.arrayContaining(['hold', 'measure']),
    );
  });

  test('hours are named at round steps with room for their figures', () => {
    const ticks = hourTicks(15 * 3600, 750);
    expect(ticks.filter((tick) => tick.isNamed).map((tick) => tick.hours)).toEqual([
      0, 3, 6, 9, 12, 15,
    ]);
    expect(ticks[1]).toEqual({ x: 50, hours: 1, isNamed: false });
  });
});
