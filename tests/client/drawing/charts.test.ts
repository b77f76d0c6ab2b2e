import { describe, expect, test } from 'vitest';
import { linearScale, niceTicks, stepPoints } from '#src/components/drawing/chart-scale.ts';
import { layOutGauge, judgeWhisker } from '#src/components/drawing/row-gauge.view.ts';
import { layOutSettling, thinPoints } from '#src/components/drawing/settling-chart.view.ts';

describe('scales', () => {
  test('a straight scale maps both ends, also downwards', () => {
    const y = linearScale([0, 10], [200, 0]);
    expect([y(0), y(5), y(10)]).toEqual([200, 100, 0]);
  });

  test('ticks are round and lie inside the span', () => {
    expect(niceTicks(-570, 590, 5)).toEqual([-500, 0, 500]);
    expect(niceTicks(0, 1, 4)).toEqual([0, 0.5, 1]);
    expect(niceTicks(3, 3, 4)).toEqual([3]);
  });

  test('a step holds its value until the next one', () => {
    expect(
      stepPoints(
        [
          { x: 0, y: 5 },
          { x: 4, y: 2 },
        ],
        10,
      ),
    ).toEqual([
      { x: 0, y: 5 },
      { x: 4, y: 5 },
      { x: 4, y: 2 },
      { x: 10, y: 2 },
    ]);
  });
});

describe('a row gauge', () => {
  const scale = 74 / 1.75;

  test('limits stand at the same place whatever the tolerance', () => {
    const coarse = layOutGauge({ error: 0, uncertainty: 1, limit: 10, guardBand: 1 }, 148);
    const fine = layOutGauge({ error: 0, uncertainty: 0.1, limit: 1, guardBand: 0.1 }, 148);
    expect(coarse).toEqual(fine);
    expect(coarse.lowLimit).toBeCloseTo(74 - scale, 10);
    expect(coarse.highLimit).toBeCloseTo(74 + scale, 10);
    expect(coarse.guardWidth).toBeCloseTo(scale / 10, 10);
  });

  test('an error off the scale is drawn at its end and marked as beyond', () => {
    const gauge = layOutGauge({ error: -5, uncertainty: 0.1, limit: 1, guardBand: 0 }, 148);
    expect(gauge.isBeyond).toBe(true);
    expect(gauge.error).toBe(4);
  });
});

describe('temperature-induced current against its allowance', () => {
  test.each([
    [0.6, 0.25, 'ok'],
    [0.75, 0.25, 'ok'],
    [1.4, 0.2, 'disturbed'],
    [0.95, 0.4, 'cannot-tell'],
    [1.2, 0.2, 'cannot-tell'],
  ] as const)('%d ± %d of 1 is %s', (value, uncertainty, verdict) => {
    expect(judgeWhisker(value, uncertainty, 1)).toBe(verdict);
  });
});

describe('the settling chart', () => {
  const points = [
    { seconds: 0, currentA: -570e-6 },
    { seconds: 21_600, currentA: 480e-6 },
  ];
  const data = { curves: [{ key: 'a', kind: 'measured' as const, points }] };

  test('the axis carries the prefix that suits the largest current', () => {
    const layout = layOutSettling(data, 700, 262);
    expect(layout.unit).toBe('µA');
    expect(layout.currentTicks.map((tick) => tick.text)).toEqual(['−500', '0', '500']);
  });

  test('time runs from the match to the end and is named every hour where there is room', () => {
    const layout = layOutSettling(data, 700, 262);
    expect(layout.x(0)).toBe(52);
    expect(layout.x(21_600)).toBe(690);
    expect(layout.timeTicks.map((tick) => tick.hours)).toEqual([0, 1, 2, 3, 4, 5, 6]);
    expect(layOutSettling(data, 358, 262).timeTicks.map((tick) => tick.hours)).toEqual([
      0, 2, 4, 6,
    ]);
  });

  test('a long curve is thinned for its table and keeps both ends', () => {
    const long = Array.from({ length: 601 }, (_, seconds) => ({ seconds, currentA: 1 }));
    const thin = thinPoints(long, 13);
    expect(thin).toHaveLength(13);
    expect([thin[0]?.seconds, thin[12]?.seconds]).toEqual([0, 600]);
  });
});
