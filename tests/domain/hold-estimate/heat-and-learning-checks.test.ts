import { describe, expect, test } from 'vitest';
import { learnRatio } from '#shared/domain/hold-estimate/learn-ratio.ts';
import { predictRatio } from '#shared/domain/hold-estimate/predict-ratio.ts';
import { ratioPrior } from '#shared/domain/hold-estimate/ratio-prior.ts';
import { readingUncertaintyBudget } from '#shared/domain/hold-estimate/reading-uncertainty-budget.ts';
import { soakAfterRamp } from '#shared/domain/hold-estimate/soak-after-ramp.ts';
import { soakAfterStep } from '#shared/domain/hold-estimate/soak-after-step.ts';
import { startRatioFromClass } from '#shared/domain/hold-estimate/start-ratio-from-class.ts';
import { thermalFigures } from '#shared/domain/hold-estimate/thermal-figures.ts';
import { thermalTimeConstant } from '#shared/domain/hold-estimate/thermal-time-constant.ts';
import { tolerableTemperatureDifference } from '#shared/domain/hold-estimate/tolerable-temperature-difference.ts';
import { updateRatioPosterior } from '#shared/domain/hold-estimate/update-ratio-posterior.ts';
import { expectDigits } from '#tests/support/expect-digits.ts';

const air = { heatCapacityJPerKgK: 1000, filmCoefficientWPerM2K: 20, conductivityWPerMK: 1 };
const tau21700S = 644.859813;

/** Bessel function J of order 0 or 1 by its power series; enough for arguments below 3. */
function besselJ(order: 0 | 1, z: number): number {
  let term = order === 0 ? 1 : z / 2;
  let sum = term;
  for (let k = 1; k < 40; k += 1) {
    term *= -((z / 2) ** 2) / (k * (k + order));
    sum += term;
  }
  return sum;
}

function findRoot(rising: (x: number) => number, high: number): number {
  let [below, above] = [1e-9, high];
  for (let round = 0; round < 200; round += 1) {
    const middle = (below + above) / 2;
    [below, above] = rising(middle) < 0 ? [middle, above] : [below, middle];
  }
  return below;
}

describe('thermal soak (derived here)', () => {
  test('a 21700 cell in moving air', () => {
    const { lumpedS } = thermalTimeConstant({
      ...air,
      massKg: 0.069,
      surfaceM2: 0.00535,
      characteristicLengthM: 0.0105,
      shape: 'cylinder',
    });
    expectDigits(lumpedS, 644.859813, 9);
  });

  test('a step of 20 K, and a ramp from 25 to 45 °C at 1 K/min', () => {
    expectDigits(
      soakAfterStep({ stepK: 20, toleranceK: 0.1, thermalTimeConstantS: tau21700S }),
      3416.67195,
      8,
    );
    const ramp = soakAfterRamp({
      fromC: 25,
      toC: 45,
      rateKPerS: 1 / 60,
      cellStartC: 25,
      toleranceK: 0.1,
      thermalTimeConstantS: tau21700S,
    });
    expectDigits(ramp.totalS, 4107.1691, 8);
    expectDigits(ramp.lagK, 9.07600075, 8);
    expect(ramp.rampS).toBeCloseTo(1200, 9);
  });

  test('cooling lags the other way and takes as long', () => {
    const shared = { rateKPerS: 1 / 60, toleranceK: 0.1, thermalTimeConstantS: tau21700S };
    const up = soakAfterRamp({ ...shared, fromC: 25, toC: 45, cellStartC: 25 });
    const down = soakAfterRamp({ ...shared, fromC: 45, toC: 25, cellStartC: 45 });
    expect(down.lagK).toBeCloseTo(-up.lagK, 12);
    expect(down.soakS).toBeCloseTo(up.soakS, 9);
  });

  test('a thick plate: the correction against the exact slowest mode', () => {
    const [density, half, film, conductivity] = [2750, 0.0135, 20, 0.8];
    const found = thermalTimeConstant({
      heatCapacityJPerKgK: 1000,
      filmCoefficientWPerM2K: film,
      conductivityWPerMK: conductivity,
      massKg: density * half,
      surfaceM2: 1,
      characteristicLengthM: half,
      shape: 'plate',
    });
    const biot = (film * half) / conductivity;
    const y = findRoot((x) => x * Math.tan(x) - biot, Math.PI / 2 - 1e-9);
    const exactS = (density * 1000 * half ** 2) / conductivity / y ** 2;
    expectDigits(exactS, 2069.41807, 9);
    expectDigits(found.timeConstantS, 2065.07812, 9);
  });

  test('a thick cylinder: the correction against the exact slowest mode', () => {
    const [density, radius] = [2670, 0.023];
    const found = thermalTimeConstant({
      ...air,
      massKg: (density * radius) / 2,
      surfaceM2: 1,
      characteristicLengthM: radius,
      shape: 'cylinder',
    });
    const z = findRoot((x) => x * besselJ(1, x) - 0.46 * besselJ(0, x), 2.4);
    expectDigits((density * 1000 * radius ** 2) / z ** 2, 1718.17982, 9);
    expectDigits(found.timeConstantS, 1711.80375, 9);
  });

  test.each([
    [thermalFigures.coin, 81, 163, 326, 1.01],
    [thermalFigures.smallPouch, 97, 194, 388, 1.02],
    [thermalFigures.cylindrical18650, 273, 547, 1093, 1.05],
    [thermalFigures.cylindrical21700, 322, 645, 1290, 1.05],
    [thermalFigures.cylindrical4680, 596, 1192, 2384, 1.12],
    [thermalFigures.prismatic, 628, 1255, 2510, 1.09],
    [thermalFigures.largePrismatic, 1064, 2128, 4255, 1.24],
  ])('format $label at three film coefficients', (figures, at40S, at20S, at10S, correction) => {
    const at = (film: number) =>
      thermalTimeConstant({ ...air, ...figures, filmCoefficientWPerM2K: film });
    // The seconds were rounded to whole ones from sizes before rounding.
    expect(Math.abs(at(40).lumpedS - at40S)).toBeLessThan(1);
    expect(Math.abs(at(20).lumpedS - at20S)).toBeLessThan(1);
    expect(Math.abs(at(10).lumpedS - at10S)).toBeLessThan(2);
    expect(Math.abs(at(20).correction - correction)).toBeLessThan(0.0051);
  });

  test('the temperature difference that matters for half a microampere', () => {
    const differenceK = tolerableTemperatureDifference({
      toleranceA: 5e-7,
      thermalTimeConstantS: 600,
      capacitanceF: 14_000,
      entropicCoefficientVPerK: 1e-4,
    });
    expectDigits((differenceK ?? NaN) * 1000, 0.214285714, 9);
  });

  test('with no dU/dT no difference matters', () => {
    const none = tolerableTemperatureDifference({
      toleranceA: 5e-7,
      thermalTimeConstantS: 600,
      capacitanceF: 14_000,
      entropicCoefficientVPerK: 0,
    });
    expect(none).toBeNull();
  });
});

describe('uncertainty of one reading after the GUM (worked example derived here)', () => {
  const example = {
    currentA: 1e-5,
    capacitanceF: 14_000,
    entropicCoefficientVPerK: 5e-5,
    entropicUncertaintyVPerK: null,
    gainLimit: 0.001,
    offsetLimitA: 2e-8,
    sourceDriftUvPerH: 0.1,
    readingSdA: 1e-6,
    effectiveCount: 60,
    temperatureMoveK: 0.004,
    windowS: 3600,
    logUncertaintyK: 0.0005,
    startResidualA: 9e-5,
    timeConstantS: 1400,
    windowStartS: 7000,
    setTemperatureLimitK: 0.2,
    setTemperatureC: 25,
    coverageFactor: 2,
  };
  const shared = {
    'meter-gain': 0.00577350269,
    'meter-offset': 0.0115470054,
    'source-drift': 0.224525105,
    noise: 0.129099445,
    'temperature-log': 0.137492985,
    settling: 0.125749588,
    'set-temperature': 0.0937382424,
  };

  test.each([
    ['not corrected', null, 0.449050209],
    ['corrected with u(dU/dT) = 0.01 mV/K', 1e-5, 0.155555556],
  ])('terms with the temperature %s', (_, entropicUncertaintyVPerK, moveUa) => {
    const budget = readingUncertaintyBudget({ ...example, entropicUncertaintyVPerK });
    const expected = { ...shared, 'temperature-move': moveUa };
    expect(budget.terms).toHaveLength(8);
    for (const term of budget.terms) {
      expectDigits(term.standardA * 1e6, expected[term.key], 8);
    }
  });

  test('combined, expanded, and degrees of freedom', () => {
    const budget = readingUncertaintyBudget(example);
    expectDigits(budget.combinedA * 1e6, 0.558923147, 9);
    expectDigits(budget.expandedA * 1e6, 1.11784629, 9);
    expectDigits(budget.effectiveDegreesOfFreedom, 20_728, 5);
  });

  test('a window of no length is refused', () => {
    expect(() => readingUncertaintyBudget({ ...example, windowS: 0 })).toThrow(RangeError);
  });
});

describe('learning the settle time (formulas of Murphy 2007; numbers derived here)', () => {
  const learned = updateRatioPosterior(ratioPrior, [1.3, 1.55, 1.1, 1.42, 1.25]);

  test('posterior after five runs', () => {
    expectDigits(learned.mean, 0.195675685, 9);
    expect(learned.kappa).toBe(7);
    expect(learned.shape).toBe(4.5);
    expectDigits(learned.rate, 0.337358446, 9);
    expect(learned.runCount).toBe(5);
  });

  test('median and 90 % ratio', () => {
    const safe = predictRatio(learned, 0.9);
    const median = predictRatio(learned, 0.5);
    expectDigits(safe.quantile, 1.38302874, 9);
    expectDigits(safe.scale, 0.292708619, 9);
    expectDigits(median.factor, 1.21613243, 9);
    expectDigits(safe.factor, 1.8230303, 8);
    expectDigits(median.factor * 50.7, 61.6579143, 9);
    expectDigits(safe.factor * 50.7, 92.4276362, 7);
  });

  test('the prior: 1 at the median, 1.94234847 at 90 %', () => {
    expect(predictRatio(ratioPrior, 0.5).factor).toBe(1);
    expectDigits(predictRatio(ratioPrior, 0.9).factor, 1.94234847, 9);
  });

  test('no runs leave the prior as it is, and one at a time equals all at once', () => {
    expect(updateRatioPosterior(ratioPrior, [])).toEqual(ratioPrior);
    const stepwise = [1.3, 1.55, 1.1, 1.42, 1.25].reduce(
      (belief, ratio) => updateRatioPosterior(belief, [ratio]),
      ratioPrior,
    );
    expect(stepwise.rate).toBeCloseTo(learned.rate, 12);
    expect(stepwise.mean).toBeCloseTo(learned.mean, 12);
  });

  test('a wild run is pulled in to four scales and told', () => {
    const wild = learnRatio(ratioPrior, 1000);
    expect(wild.wasWinsorised).toBe(true);
    expect(wild.usedRatio).toBeCloseTo(Math.exp(4 * Math.sqrt(0.1875)), 9);
    expect(learnRatio(ratioPrior, 1.2).wasWinsorised).toBe(false);
  });

  test('forgetting keeps the belief open to change', () => {
    let belief = ratioPrior;
    for (let run = 0; run < 2000; run += 1) {
      belief = learnRatio(belief, 1.5).posterior;
    }
    expect(belief.kappa).toBeLessThan(51);
    expect(Math.exp(belief.mean)).toBeCloseTo(1.5, 3);
  });

  test('a new cell type starts from its class with the weight of four runs', () => {
    const start = startRatioFromClass({ ...learned, kappa: 40, shape: 20, rate: 2 });
    expect(start).toEqual({ mean: learned.mean, kappa: 4, shape: 4, rate: 0.4, runCount: 0 });
  });

  test('a ratio of zero or a probability of one is refused', () => {
    expect(() => updateRatioPosterior(ratioPrior, [0])).toThrow(RangeError);
    expect(() => predictRatio(ratioPrior, 1)).toThrow(RangeError);
  });
});
