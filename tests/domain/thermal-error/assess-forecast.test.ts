import { describe, expect, test } from 'vitest';
import {
  assessForecast,
  type ForecastInput,
} from '#shared/domain/thermal-error/assess-forecast.ts';
import { attenuateSwing } from '#shared/domain/thermal-error/attenuate-swing.ts';
import { sourceDriftCurrent } from '#shared/domain/thermal-error/source-drift-current.ts';
import type { StabilityAssessment } from '#shared/domain/thermal-error/types.ts';
import { expectDigits } from '#tests/support/expect-digits.ts';

const steady: StabilityAssessment = {
  driftKPerH: 0.001,
  halfBandK: 0.0005,
  periodS: 600,
  resolutionK: 0.001,
  hoursLogged: 72,
  sensorPlace: 'air',
};

function buildForecast(detail: Partial<ForecastInput> = {}): ForecastInput {
  return {
    stability: steady,
    sourceDriftUvPerH: 0.05,
    capacitanceF: 14_000,
    entropicCoefficientVPerK: -5e-5,
    entropicBoundVPerK: 1.5e-4,
    thermalTimeConstantS: 645,
    timeConstantS: 1320,
    windowS: 4 * 3600,
    allowanceA: 1.05e-6,
    ...detail,
  };
}

describe('forecast of the false current (derived here)', () => {
  test('the terms follow their formulas', () => {
    const result = assessForecast(buildForecast());
    const swingK = attenuateSwing({
      halfBandK: 0.0005,
      periodS: 600,
      thermalTimeConstantS: 645,
      timeConstantS: 1320,
    });
    const charge = 14_000 * 5e-5;
    expectDigits(result.forecastA, charge * (0.001 / 3600 + (2 * swingK) / 14_400), 10);
    expectDigits(result.driftA, (14_000 * 0.05) / 3.6e9, 10);
    expectDigits(result.whiskerA, (2 * charge * Math.SQRT2 * 0.001) / Math.sqrt(12) / 14_400, 10);
    expectDigits(result.boundForecastA, 3 * result.forecastA, 10);
    expect(result.terms.map((term) => term.key)).toEqual([
      'chamber-drift',
      'chamber-swing',
      'source-drift',
      'log-resolution',
    ]);
  });

  test('a steady chamber and a quiet source are ok', () => {
    const result = assessForecast(buildForecast());
    expect(result.verdict).toBe('ok');
    expect(result.lengthAtWhichLogCouldTellS).toBeNull();
  });

  test('a strong drift is disturbed, whichever its sign', () => {
    for (const driftKPerH of [0.02, -0.02]) {
      const stability = { ...steady, driftKPerH };
      expect(assessForecast(buildForecast({ stability })).verdict).toBe('disturbed');
    }
  });

  test('a coarse log cannot tell, and from the length it names it can', () => {
    const stability = { ...steady, resolutionK: 0.1 };
    const result = assessForecast(buildForecast({ stability }));
    expect(result.verdict).toBe('cannot-tell');
    const lengthS = result.lengthAtWhichLogCouldTellS ?? NaN;
    expect(lengthS).toBeGreaterThan(4 * 3600);
    const verdictAt = (windowS: number): string =>
      assessForecast(buildForecast({ stability, windowS })).verdict;
    expect(verdictAt(lengthS * 1.001)).toBe('ok');
    expect(verdictAt(lengthS * 0.999)).toBe('cannot-tell');
  });

  test('a coarse log of a strong drift condemns the chamber from the length it names', () => {
    const stability = { ...steady, resolutionK: 0.1, driftKPerH: 0.007 };
    const at = (windowS: number) => assessForecast(buildForecast({ stability, windowS }));
    const lengthS = at(3600).lengthAtWhichLogCouldTellS ?? NaN;
    expect(at(3600).verdict).toBe('cannot-tell');
    expect(at(lengthS * 1.001).verdict).toBe('disturbed');
  });

  test('a drift between default and bound stays undecided for ever', () => {
    const stability = { ...steady, driftKPerH: 0.003, resolutionK: 0.0001 };
    const result = assessForecast(buildForecast({ stability }));
    expect(result.verdict).toBe('cannot-tell');
    expect(result.lengthAtWhichLogCouldTellS).toBeNull();
  });

  test('an unknown period counts the whole band; a sensor on the cell skips the thermal pole', () => {
    const base = { halfBandK: 0.1, timeConstantS: 1320 };
    expect(attenuateSwing({ ...base, periodS: null, thermalTimeConstantS: 645 })).toBe(0.1);
    const air = assessForecast(buildForecast());
    const stability = { ...steady, sensorPlace: 'cell' } as const;
    const onCell = assessForecast(buildForecast({ stability }));
    expect(onCell.forecastA).toBeGreaterThan(air.forecastA);
  });

  test('an NMC cell of any size allows 0.27 µV/h, or 5.4 / 1.8 mK/h, at 10 % of 3 µA/Ah', () => {
    for (const capacityAh of [1, 3.5, 35, 200]) {
      const capacitanceF = 4000 * capacityAh;
      const allowanceA = 0.1 * 3e-6 * capacityAh;
      const perMicrovoltA = sourceDriftCurrent({ capacitanceF, driftUvPerH: 1 });
      expect(allowanceA / perMicrovoltA).toBeCloseTo(0.27, 10);
      const silent = { ...steady, halfBandK: 0, resolutionK: 0 };
      const largestDrift = (boundVPerK: number, driftKPerH: number): string =>
        assessForecast(
          buildForecast({
            capacitanceF,
            allowanceA,
            sourceDriftUvPerH: 0,
            entropicCoefficientVPerK: boundVPerK,
            entropicBoundVPerK: boundVPerK,
            stability: { ...silent, driftKPerH },
          }),
        ).verdict;
      expect(largestDrift(5e-5, 0.005399)).toBe('ok');
      expect(largestDrift(5e-5, 0.005401)).toBe('disturbed');
      expect(largestDrift(1.5e-4, 0.001799)).toBe('ok');
      expect(largestDrift(1.5e-4, 0.001801)).toBe('disturbed');
    }
  });

  test('a bound below the default, or a window of no length, is refused', () => {
    expect(() => assessForecast(buildForecast({ entropicBoundVPerK: 1e-5 }))).toThrow(RangeError);
    expect(() => assessForecast(buildForecast({ windowS: 0 }))).toThrow(RangeError);
    expect(() => assessForecast(buildForecast({ allowanceA: NaN }))).toThrow(RangeError);
  });
});
