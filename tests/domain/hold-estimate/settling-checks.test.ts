import { describe, expect, test } from 'vitest';
import { capacitanceFromVoltageCurve } from '#shared/domain/hold-estimate/capacitance-from-voltage-curve.ts';
import { diffusionTimeConstant } from '#shared/domain/hold-estimate/diffusion-time-constant.ts';
import { holdCircuit } from '#shared/domain/hold-estimate/hold-circuit.ts';
import { openCircuitVoltageMethodDays } from '#shared/domain/hold-estimate/open-circuit-voltage-method-days.ts';
import { overhangCurrent } from '#shared/domain/hold-estimate/overhang-current.ts';
import { particleDiffusionTime } from '#shared/domain/hold-estimate/particle-diffusion-time.ts';
import { screeningThreshold } from '#shared/domain/hold-estimate/screening-threshold.ts';
import { screeningTime } from '#shared/domain/hold-estimate/screening-time.ts';
import { settledTest } from '#shared/domain/hold-estimate/settled-test.ts';
import { settlingCurrent } from '#shared/domain/hold-estimate/settling-current.ts';
import { steadyCurrentFromThreeReadings } from '#shared/domain/hold-estimate/steady-current-from-three-readings.ts';
import { timeConstant } from '#shared/domain/hold-estimate/time-constant.ts';
import { timeToTolerance } from '#shared/domain/hold-estimate/time-to-tolerance.ts';
import { windowMeanResidual } from '#shared/domain/hold-estimate/window-mean-residual.ts';
import { worstStartResidual } from '#shared/domain/hold-estimate/worst-start-residual.ts';
import { openCircuitVoltageV } from '#tests/support/chen-2020-curves.ts';
import { expectDigits } from '#tests/support/expect-digits.ts';

const micro = 1e-6;
const tauS = 1400;

describe('the hold circuit (derived here)', () => {
  test('steady current and exact time constant of a 14 000 F cell', () => {
    const circuit = holdCircuit({
      capacitanceF: 14_000,
      seriesResistanceOhm: 0.1,
      leakageResistanceOhm: 370_000,
      voltageV: 3.7,
    });
    expectDigits(circuit.steadyCurrentA / micro, 9.9999973, 8);
    expectDigits(circuit.timeConstantS, 1399.99962, 9);
  });

  test('current one time constant after a mismatch of +10 µV', () => {
    const currentA = settlingCurrent({
      steadyCurrentA: 10 * micro,
      startMismatchV: 10 * micro,
      seriesResistanceOhm: 0.1,
      timeConstantS: tauS,
      timeS: tauS,
    });
    expectDigits(currentA / micro, 43.1091497, 9);
  });

  test.each([
    [0, 0.1, 3223.61913],
    [0, 0.05, 4194.02518],
    [10, 0.1, 6299.73354],
    [10, 0.05, 7270.13959],
    [-10, 0.1, 6580.67251],
    [-10, 0.05, 7551.07856],
    [100, 0.1, 9656.78692],
    [100, 0.05, 10_627.193],
  ])('a mismatch of %d µV settles to a fraction of %d in %d s', (mismatchUv, fraction, seconds) => {
    const startResidual = (mismatchUv * micro) / 0.1 - 10 * micro;
    const tolerance = fraction * 10 * micro;
    expectDigits(timeToTolerance({ startResidual, tolerance, timeConstantS: tauS }), seconds, 8);
  });

  test('the worse sign of the mismatch adds to the steady current', () => {
    const residualA = worstStartResidual({
      startMismatchV: -10 * micro,
      seriesResistanceOhm: 0.1,
      steadyCurrentA: 10 * micro,
    });
    expectDigits(
      timeToTolerance({ startResidual: residualA, tolerance: micro, timeConstantS: tauS }),
      6580.67251,
      8,
    );
  });

  test('a start inside the tolerance needs no time', () => {
    expect(timeToTolerance({ startResidual: 1, tolerance: 1, timeConstantS: tauS })).toBe(0);
  });

  test('mean residual of a window that starts at four time constants', () => {
    const residualA = windowMeanResidual({
      startResidualA: 90 * micro,
      timeConstantS: tauS,
      windowStartS: 5600,
      windowS: 1800,
    });
    expectDigits(residualA / micro, 0.92765573, 8);
  });

  test('three readings of one exponential give its end; a straight line gives none', () => {
    const at = (timeS: number): number => 10 + 90 * Math.exp(-timeS / tauS);
    const found = steadyCurrentFromThreeReadings({
      firstA: at(0),
      secondA: at(600),
      thirdA: at(1200),
    });
    expect(found).toBeCloseTo(10, 9);
    expect(steadyCurrentFromThreeReadings({ firstA: 3, secondA: 2, thirdA: 1 })).toBeNull();
  });

  test('the settled test weighs slope and its standard error against the tolerance', () => {
    const quiet = {
      slopeAPerS: -1e-10,
      readingSdA: 1e-7,
      sampleIntervalS: 10,
      readingCount: 60,
      timeConstantS: tauS,
      coverageZ: 1.645,
    };
    const result = settledTest({ ...quiet, toleranceA: 1e-6 });
    expectDigits(result.residualA, 1.4e-7, 9);
    expectDigits(result.standardErrorA, (tauS * 1e-7) / (10 * Math.sqrt((60 * 3599) / 12)), 9);
    expect(result.isSettled).toBe(true);
    expect(settledTest({ ...quiet, toleranceA: 1.5e-7 }).isSettled).toBe(false);
    expect(() => settledTest({ ...quiet, readingCount: 2, toleranceA: 1 })).toThrow(RangeError);
  });
});

describe('time constants', () => {
  test('by capacity (derived here)', () => {
    const cell = { capacitanceFPerAh: 4000, resistanceOhmAh: 0.12, capacityAh: 3.5 };
    expectDigits(timeConstant({ ...cell, externalResistanceOhm: 0.06 }), 1320);
  });

  test('a 10 Ω burden on a 14 000 F cell of 0.1 Ω gives 39.2777778 h (derived here)', () => {
    const slowS = timeConstant({
      capacitanceFPerAh: 4000,
      resistanceOhmAh: 0.35,
      capacityAh: 3.5,
      externalResistanceOhm: 10,
    });
    expectDigits(slowS / 3600, 39.2777778, 9);
  });

  test('diffusion adds a third of its resistance; the exact slowest mode is close (derived here)', () => {
    const [seriesOhm, diffusionOhm, capacitanceF] = [0.1, 0.05, 14_000];
    const approximateS = diffusionTimeConstant({
      capacitanceF,
      seriesResistanceOhm: seriesOhm,
      diffusionResistanceOhm: diffusionOhm,
    });
    expectDigits(approximateS, 1633.33333, 9);
    let [low, high] = [1e-9, Math.PI / 2 - 1e-9];
    for (let round = 0; round < 100; round += 1) {
      const y = (low + high) / 2;
      [low, high] = y * Math.tan(y) < diffusionOhm / seriesOhm ? [y, high] : [low, y];
    }
    const exactS = (diffusionOhm * capacitanceF) / low ** 2;
    expectDigits(exactS, 1640.25372, 9);
    expect(Math.abs(approximateS / exactS - 1)).toBeLessThan(0.005);
  });

  test('slowest particle mode of the Chen 2020 cathode', () => {
    expectDigits(
      particleDiffusionTime({ radiusM: 5.22e-6, diffusivityM2PerS: 4e-15 }),
      690.210035,
      9,
    );
  });

  test.each([
    [0.3, 3361.22045],
    [0.5, 4022.40347],
  ])('capacitance at state of charge %d from the curves of Chen 2020', (soc, expected) => {
    const found = capacitanceFromVoltageCurve({
      lowSoc: soc - 0.025,
      highSoc: soc + 0.025,
      lowV: openCircuitVoltageV(soc - 0.025),
      highV: openCircuitVoltageV(soc + 0.025),
    });
    expectDigits(found ?? NaN, expected, 8);
  });

  test('a flat curve has no capacitance to read', () => {
    const flat = { lowSoc: 0.4, highSoc: 0.5, lowV: 3.3, highV: 3.3 };
    expect(capacitanceFromVoltageCurve(flat)).toBeNull();
  });

  test('a loss of 0.2 % in 30 days is 2.77777778 µA/Ah (published 2019, 18650 NMC)', () => {
    expectDigits((0.002 * 3600) / (30 * 86_400) / micro, 2.77777778, 9);
  });
});

describe('overhang current after the last charge or discharge (figures of Lewerenz 2018 kind, derived here)', () => {
  const cell = {
    overhangFraction: 0.03,
    stateOfChargeStep: 0.2,
    capacityAh: 5,
    timeConstantDays: 20,
  };

  test('at once and after 30 days, with the sign of the last current', () => {
    expectDigits(overhangCurrent({ ...cell, restDays: 0, lastWas: 'charge' }) / micro, 62.5);
    expectDigits(
      overhangCurrent({ ...cell, restDays: 30, lastWas: 'charge' }) / micro,
      13.945635,
      8,
    );
    expect(overhangCurrent({ ...cell, restDays: 0, lastWas: 'discharge' })).toBeLessThan(0);
  });
});

describe('screening (derived here, confirmed by Monte Carlo)', () => {
  const base = {
    readingSdA: 0.5 * micro,
    falseAlarm: 0.01,
    miss: 0.01,
    timeConstantS: 1320,
  };

  test.each([
    ['10 against 50 µA', 40, 1 / 0.0943, 1064.75146],
    ['10 against 300 µA', 290, 1 / 0.0943, 207.6898],
    ['the start current read and subtracted', 40, 0.5, 108.721785],
  ])('%s', (_, differenceUa, startSdUa, seconds) => {
    const result = screeningTime({
      ...base,
      differenceA: differenceUa * micro,
      startSdA: startSdUa * micro,
    });
    expect(result.outcome).toBe('ok');
    expectDigits(result.outcome === 'ok' ? result.timeS : NaN, seconds, 7);
  });

  test('threshold at that time', () => {
    const thresholdA = screeningThreshold({
      goodCurrentA: 10 * micro,
      differenceA: 40 * micro,
      falseAlarm: 0.01,
      miss: 0.01,
      timeS: 1064.75146,
      timeConstantS: 1320,
    });
    expectDigits(thresholdA / micro, 16.6092056, 8);
  });

  test('a difference below Z·s_m can never be told', () => {
    const never = screeningTime({ ...base, differenceA: 2 * micro, startSdA: 0 });
    expect(never.outcome).toBe('impossible');
  });

  test('without noise the time is τ·ln(1 + Z·a/D)', () => {
    const result = screeningTime({ ...base, readingSdA: 0, differenceA: 4e-5, startSdA: 1e-5 });
    const expected = 1320 * Math.log(1 + (result.separationZ * 1e-5) / 4e-5);
    expectDigits(result.outcome === 'ok' ? result.timeS : NaN, expected, 10);
  });

  test('the condition holds at the time found', () => {
    const [differenceA, startSdA] = [4e-5, 1e-5];
    const result = screeningTime({ ...base, differenceA, startSdA });
    const x = Math.exp(-(result.outcome === 'ok' ? result.timeS : NaN) / 1320);
    expect(differenceA * (1 - x)).toBeCloseTo(
      result.separationZ * Math.hypot(startSdA * x, base.readingSdA),
      14,
    );
  });

  test('a risk of one half or more is refused', () => {
    expect(() => screeningTime({ ...base, miss: 0.5, differenceA: 1, startSdA: 0 })).toThrow(
      RangeError,
    );
  });
});

describe('the open-circuit voltage method (derived here)', () => {
  test.each([
    ['3.5 Ah at 4000 F/Ah', 14_000, 10, 16.2037037],
    ['280 Ah LFP on the plateau', 280 * 30_000, 840, 115.740741],
    ['3.5 Ah at a flat spot of 10 600 F/Ah', 3.5 * 10_600, 10, 42.9398148],
  ])('%s', (_, capacitanceF, currentUa, days) => {
    const found = openCircuitVoltageMethodDays({
      signalToUncertainty: 10,
      voltageUncertaintyV: 1e-4,
      capacitanceF,
      currentA: currentUa * micro,
    });
    expectDigits(found, days, 8);
  });

  test('10 µA on 14 000 F is 61.7142857 µV a day', () => {
    const days = openCircuitVoltageMethodDays({
      signalToUncertainty: 1,
      voltageUncertaintyV: 61.7142857e-6,
      capacitanceF: 14_000,
      currentA: 10 * micro,
    });
    expectDigits(days, 1, 8);
  });
});
