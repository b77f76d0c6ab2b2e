import { describe, expect, test } from 'vitest';
import { dayHours, placeDoors } from '#src/components/drawing/day-tide.view.ts';
import { cutSpan, weekTicks } from '#src/components/drawing/due-strip.view.ts';
import { levelStrokes, tidePoints } from '#src/components/drawing/tide-line.view.ts';
import { waterLevel } from '#src/components/layout/waterline.view.ts';

const hour = 3_600_000;
const day = 24 * hour;
const midnight = Date.parse('2026-06-16T00:00:00+01:00');
const window = { startMs: midnight + 6 * hour, endMs: midnight + 21 * hour };

describe('the day at a site', () => {
  test('hours are those of the site and thin out where the drawing is narrow', () => {
    const wide = dayHours(window, 'Europe/Dublin', 1180);
    expect(wide[0]).toEqual({ x: 0, text: '06' });
    expect(wide).toHaveLength(15);
    expect(dayHours(window, 'Europe/Dublin', 358).map((each) => each.text)).toEqual([
      '06',
      '08',
      '10',
      '12',
      '14',
      '16',
      '18',
      '20',
    ]);
  });

  test('door words never stand on another upright', () => {
    const doors = [8.5, 9, 16.5, 17.2].map((at) => ({
      atMs: midnight + at * hour,
      label: 'C03 door',
    }));
    expect(placeDoors(doors, window, 1180).map((door) => door.side)).toEqual([
      'left',
      'right',
      'left',
      'right',
    ]);
    expect(placeDoors(doors, window, 200).some((door) => door.side === 'none')).toBe(true);
  });
});

describe('the tide of a chamber', () => {
  test('the line starts at what was taken before the window and keeps to it', () => {
    const steps = [
      { atMs: window.startMs - hour, taken: 3 },
      { atMs: window.startMs + 3 * hour, taken: 8 },
      { atMs: window.endMs + hour, taken: 0 },
    ];
    expect(tidePoints(steps, window, 150, (taken) => taken)).toEqual([
      { x: 0, y: 3 },
      { x: 30, y: 3 },
      { x: 30, y: 8 },
      { x: 150, y: 8 },
    ]);
  });

  test('the set temperature slants where it changes', () => {
    const strokes = levelStrokes(
      [
        { startMs: 0, endMs: 40, temperatureC: 25 },
        { startMs: 50, endMs: 120, temperatureC: 45 },
      ],
      { startMs: 0, endMs: 100 },
      100,
      (temperatureC) => `${temperatureC} °C`,
    );
    expect(strokes).toEqual([
      { kind: 'level', x1: 0, x2: 40, text: '25 °C' },
      { kind: 'slant', x1: 40, x2: 50, isRising: true },
      { kind: 'level', x1: 50, x2: 100, text: '45 °C' },
    ]);
  });
});

describe('the weeks to a due date', () => {
  test('weeks begin on the site’s Mondays, also over a clock change', () => {
    const autumn = Date.parse('2026-10-19T00:00:00+01:00');
    const ticks = weekTicks({ startMs: autumn, endMs: autumn + 21 * day }, 'Europe/Dublin', 210);
    expect(ticks.map((tick) => tick.text)).toEqual(['19 Oct', '26 Oct', '2 Nov']);
    expect(ticks[1]?.x).toBeCloseTo(70 + 10 / 24, 6);
  });

  test('a span outside the window is not drawn, one across its edge is cut', () => {
    const frame = { startMs: 0, endMs: 100 };
    expect(cutSpan({ startMs: -20, endMs: 10 }, frame, 100)).toEqual({ x: 0, width: 10 });
    expect(cutSpan({ startMs: 100, endMs: 120 }, frame, 100)).toBeUndefined();
  });
});

test('the water of a vessel is the share of positions taken', () => {
  expect(waterLevel({ taken: 0, positions: 8 })).toEqual({ y: 21, height: 0 });
  expect(waterLevel({ taken: 8, positions: 8 })).toEqual({ y: 1.5, height: 19.5 });
  expect(waterLevel({ taken: 4, positions: 8 }).height).toBeCloseTo(9.75, 10);
  expect(waterLevel({ taken: 0, positions: 0 }).height).toBe(0);
});
