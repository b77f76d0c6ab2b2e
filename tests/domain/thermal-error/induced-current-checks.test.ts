import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { arrheniusFactor } from '#shared/domain/thermal-error/arrhenius-factor.ts';
import { arrheniusSensitivity } from '#shared/domain/thermal-error/arrhenius-sensitivity.ts';
import { cascadeStep } from '#shared/domain/thermal-error/cascade-step.ts';
import { inducedCurrentFromLog } from '#shared/domain/thermal-error/induced-current-from-log.ts';
import { logResolutionFloor } from '#shared/domain/thermal-error/log-resolution-floor.ts';
import { rampInducedCurrent } from '#shared/domain/thermal-error/ramp-induced-current.ts';
import { sineInducedCurrent } from '#shared/domain/thermal-error/sine-induced-current.ts';
import { sourceDriftCurrent } from '#shared/domain/thermal-error/source-drift-current.ts';
import { sourceDriftFromLog } from '#shared/domain/thermal-error/source-drift-from-log.ts';
import { stepInducedCurrent } from '#shared/domain/thermal-error/step-induced-current.ts';
import { stepPeakTime } from '#shared/domain/thermal-error/step-peak-time.ts';
import { twoPoleKernel } from '#shared/domain/thermal-error/two-pole-kernel.ts';
import { windowBound } from '#shared/domain/thermal-error/window-bound.ts';
import { worstSineCurrent } from '#shared/domain/thermal-error/worst-sine-current.ts';
import { entropicCoefficientMvPerK } from '#tests/support/chen-2020-curves.ts';
import { expectDigits } from '#tests/support/expect-digits.ts';

const cell = { capacitanceF: 14_000, entropicCoefficientVPerK: 1e-4 };
const poles = { thermalTimeConstantS: 600, timeConstantS: 1400 };
const micro = 1e-6;
const times = [0, 60, 150, 300, 480, 900, 1500, 2400, 3600];
const temperatures = [25, 25.02, 25.05, 25.04, 25.1, 25.08, 25.15, 25.12, 25.2];
const samples = times.map((timeS, index) => ({ timeS, temperatureC: temperatures[index] ?? NaN }));
const log = {
  samples,
  windowStartS: 900,
  windowEndS: 3600,
  matchAtS: null,
  ...cell,
  ...poles,
};

describe('closed forms of the induced current (derived here)', () => {
  test('ramp of 0.1 K/h: steady and after half an hour', () => {
    const ramp = { ...cell, ...poles, rateKPerS: 0.1 / 3600 };
    expectDigits(rampInducedCurrent(ramp) / micro, -38.8888889, 9);
    expectDigits(rampInducedCurrent({ ...ramp, timeS: 1800 }) / micro, -21.526846, 8);
  });

  test('ramp with equal time constants', () => {
    const ramp = { ...cell, rateKPerS: 1, thermalTimeConstantS: 500, timeConstantS: 500 };
    expect(rampInducedCurrent({ ...ramp, timeS: 500 })).toBeCloseTo(-1.4 * (1 - 2 / Math.E), 12);
  });

  test('sine of 0.1 K in 600 s', () => {
    const sine = sineInducedCurrent({ ...cell, ...poles, amplitudeK: 0.1, periodS: 600 });
    expectDigits(sine.amplitudeA / micro, 15.6812364, 9);
    expectDigits(sine.phaseRad, 1.79673129, 9);
    const bound = windowBound({ amplitudeA: sine.amplitudeA, periodS: 600, windowS: 1800 });
    expectDigits(bound / micro, 1.66383086, 9);
  });

  test('worst sine, and no other period exceeds it', () => {
    const worst = worstSineCurrent({ ...cell, ...poles, amplitudeK: 0.1 });
    expectDigits(worst.amplitudeA / micro, 70);
    fc.assert(
      fc.property(fc.double({ min: 10, max: 1e6, noNaN: true }), (periodS) => {
        const sine = sineInducedCurrent({ ...cell, ...poles, amplitudeK: 0.1, periodS });
        expect(sine.amplitudeA).toBeLessThanOrEqual(worst.amplitudeA * (1 + 1e-12));
      }),
    );
    const at = sineInducedCurrent({ ...cell, ...poles, amplitudeK: 0.1, periodS: worst.periodS });
    expectDigits(at.amplitudeA, worst.amplitudeA, 10);
  });

  test('step: peak time, and the current is largest there', () => {
    const peakS = stepPeakTime(poles);
    expectDigits(peakS, 889.662753, 9);
    const at = (timeS: number): number =>
      Math.abs(stepInducedCurrent({ ...cell, ...poles, stepK: 3, timeS }));
    expect(at(peakS)).toBeGreaterThan(at(peakS - 5));
    expect(at(peakS)).toBeGreaterThan(at(peakS + 5));
    expect(stepPeakTime({ thermalTimeConstantS: 700, timeConstantS: 700 })).toBe(700);
  });

  test('the kernel is symmetric and smooth where the time constants meet', () => {
    const equal = twoPoleKernel({ timeS: 900, firstS: 600, secondS: 600 });
    const near = twoPoleKernel({ timeS: 900, firstS: 600, secondS: 600 * (1 + 1e-10) });
    expectDigits(equal, (900 / 600 ** 2) * Math.exp(-1.5), 12);
    expectDigits(near, equal, 9);
    expect(twoPoleKernel({ timeS: 900, firstS: 10, secondS: 600 })).toBe(
      twoPoleKernel({ timeS: 900, firstS: 600, secondS: 10 }),
    );
    expect(twoPoleKernel({ timeS: 60, firstS: 0, secondS: 600 })).toBeCloseTo(Math.exp(-0.1) / 600);
    expect(() => twoPoleKernel({ timeS: NaN, firstS: 1, secondS: 1 })).toThrow(RangeError);
  });

  test('resolution floor of coarse and fine logs', () => {
    const coarse = logResolutionFloor({ ...cell, resolutionK: 0.1, windowS: 1800 });
    const fine = logResolutionFloor({ ...cell, resolutionK: 0.01, windowS: 4 * 3600 });
    expectDigits(coarse / micro, 31.7526448, 9);
    expectDigits(fine / micro, 0.39690806, 8);
  });

  test('one microvolt an hour on 14 000 F is 3.89 µA', () => {
    expectDigits(sourceDriftCurrent({ capacitanceF: 14_000, driftUvPerH: 1 }) / micro, 3.8888889);
  });
});

describe('published temperature coefficients', () => {
  test.each([
    [0.3, -0.0435904337],
    [0.1, -0.362713217],
    [0.8, 0.0516380712],
  ])("dU/dT at state of charge %d after O'Regan 2022", (soc, expected) => {
    expectDigits(entropicCoefficientMvPerK(soc), expected, 8);
  });

  test('leakage rises by 8.11796992 % a kelvin at 25 °C (60 kJ/mol, Theiler 2021)', () => {
    const shared = { activationEnergyJPerMol: 60_000 };
    expectDigits(arrheniusSensitivity({ ...shared, temperatureC: 25 }) * 100, 8.11796992, 9);
    expect(arrheniusFactor({ ...shared, temperatureC: 25, referenceC: 25 })).toBe(1);
    const step = 1e-4;
    const slope =
      (arrheniusFactor({ ...shared, temperatureC: 25 + step, referenceC: 25 }) - 1) / step;
    expectDigits(slope * 100, 8.118, 4);
    expect(() => arrheniusFactor({ ...shared, temperatureC: -274, referenceC: 25 })).toThrow(
      RangeError,
    );
  });
});

describe('exact window mean from an irregular log (derived here; checked against Runge-Kutta)', () => {
  test.each([
    ['first-order', 25.1659492, 25.1140213, 25.0150775, -51.9278429, -51.3042267],
    ['zero-order', 25.121728, 25.1018298, null, -19.8982101, -45.8458921],
  ] as const)('%s hold', (hold, cellC, filteredC, filteredAtStartC, currentUa, meanUa) => {
    const result = inducedCurrentFromLog({ ...log, hold });
    if (result.outcome !== 'ok') {
      throw new Error(result.reason);
    }
    expectDigits(result.atEnd.cellC, cellC, 8);
    expectDigits(result.atEnd.filteredC, filteredC, 8);
    if (filteredAtStartC !== null) {
      expectDigits(result.atStart.filteredC, filteredAtStartC, 9);
    }
    expectDigits(result.currentAtEndA / micro, currentUa, 8);
    expectDigits(result.meanA / micro, meanUa, 8);
    expect(result.startsLate).toBe(true);
    expect(result.hasGap).toBe(true);
    expect(result.longestStepS).toBe(1200);
  });

  test('a log that ends early or begins after the match is not used', () => {
    const early = inducedCurrentFromLog({ ...log, windowEndS: 4000, hold: 'first-order' });
    expect(early.outcome).toBe('not-covered');
    const none = inducedCurrentFromLog({ ...log, samples: [], hold: 'first-order' });
    expect(none.outcome).toBe('not-covered');
    const late = inducedCurrentFromLog({ ...log, matchAtS: -10, hold: 'first-order' });
    expect(late.outcome).toBe('not-covered');
  });

  test('a logged ramp gives the closed form, whatever the spacing', () => {
    const rateKPerS = 1e-5;
    fc.assert(
      fc.property(fc.uniqueArray(fc.integer({ min: 1, max: 7199 }), { maxLength: 30 }), (inner) => {
        const instants = [0, ...inner.toSorted((a, b) => a - b), 7200];
        const result = inducedCurrentFromLog({
          ...log,
          samples: instants.map((timeS) => ({ timeS, temperatureC: 25 + rateKPerS * timeS })),
          windowStartS: 3600,
          windowEndS: 7200,
          hold: 'first-order',
        });
        const expected = rampInducedCurrent({ ...cell, ...poles, rateKPerS, timeS: 7200 });
        expect(result.outcome === 'ok' ? result.currentAtEndA : NaN).toBeCloseTo(expected, 13);
      }),
      { numRuns: 50 },
    );
  });

  test('after the match the current starts again from nothing', () => {
    const flat = inducedCurrentFromLog({
      ...log,
      samples: [
        { timeS: 0, temperatureC: 24 },
        { timeS: 1, temperatureC: 25 },
        { timeS: 90_000, temperatureC: 25 },
      ],
      windowStartS: 80_000,
      windowEndS: 90_000,
      matchAtS: 20_000,
      hold: 'first-order',
    });
    expect(flat.outcome === 'ok' ? Math.abs(flat.meanA) : NaN).toBeLessThan(1e-15);
  });

  test('a cell whose sensor sits on it follows at once', () => {
    const next = cascadeStep({
      state: { cellC: 20, filteredC: 20 },
      stepS: 100,
      startC: 20,
      endC: 21,
      thermalTimeConstantS: 0,
      timeConstantS: 100,
      hold: 'first-order',
    });
    expect(next.cellC).toBe(21);
    expect(next.filteredC).toBeCloseTo(20 + Math.exp(-1), 12);
  });

  test('near-equal time constants join the equal case', () => {
    const step = {
      state: { cellC: 24, filteredC: 23 },
      stepS: 120,
      startC: 25,
      endC: 25.5,
      timeConstantS: 600,
      hold: 'first-order',
    } as const;
    const equal = cascadeStep({ ...step, thermalTimeConstantS: 600 });
    const near = cascadeStep({ ...step, thermalTimeConstantS: 600 * (1 + 1e-9) });
    expect(near.filteredC).toBeCloseTo(equal.filteredC, 8);
  });

  test('two half steps equal one whole step', () => {
    const shared = { ...poles, hold: 'first-order' } as const;
    const start = { cellC: 24, filteredC: 23 };
    const whole = cascadeStep({ ...shared, state: start, stepS: 200, startC: 25, endC: 26 });
    const half = cascadeStep({ ...shared, state: start, stepS: 100, startC: 25, endC: 25.5 });
    const second = cascadeStep({ ...shared, state: half, stepS: 100, startC: 25.5, endC: 26 });
    expect(second.cellC).toBeCloseTo(whole.cellC, 12);
    expect(second.filteredC).toBeCloseTo(whole.filteredC, 12);
  });

  test('a steadily drifting source pushes C·dV/dt', () => {
    const result = sourceDriftFromLog({
      samples: [
        { timeS: 0, voltageV: 3.7 },
        { timeS: 50_000, voltageV: 3.7 + 50_000 * (1e-6 / 3600) },
      ],
      windowStartS: 40_000,
      windowEndS: 50_000,
      capacitanceF: 14_000,
      timeConstantS: 1400,
    });
    expect(result.outcome === 'ok' ? result.meanA / micro : NaN).toBeCloseTo(3.8888889, 5);
  });

  test('samples out of order are refused', () => {
    expect(() =>
      inducedCurrentFromLog({ ...log, samples: samples.toReversed(), hold: 'first-order' }),
    ).toThrow(RangeError);
  });
});
