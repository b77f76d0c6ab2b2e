import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { arrheniusSensitivity } from '#shared/domain/thermal-error/arrhenius-sensitivity.ts';
import { leakageActivationEnergyJPerMol } from '#shared/domain/thermal-error/arrhenius-factor.ts';
import { windowMeanResidual } from './window-mean-residual.ts';

export type ReadingBudgetInput = {
  readonly currentA: number;
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  /** Standard uncertainty of dU/dT, V/K; `null` when the temperature term was not subtracted. */
  readonly entropicUncertaintyVPerK: number | null;
  /** Limit of the meter's gain error, relative. */
  readonly gainLimit: number;
  readonly offsetLimitA: number;
  readonly sourceDriftUvPerH: number;
  readonly readingSdA: number;
  readonly effectiveCount: number;
  /** Movement of the filtered cell temperature over the window, K. */
  readonly temperatureMoveK: number;
  readonly windowS: number;
  /** Standard uncertainty of one log reading, K. */
  readonly logUncertaintyK: number;
  /** Start residual of the settling, A, and when the window starts after the match. */
  readonly startResidualA: number;
  readonly timeConstantS: number;
  readonly windowStartS: number;
  /** Limit of the set temperature's error, K. */
  readonly setTemperatureLimitK: number;
  readonly setTemperatureC: number;
  readonly coverageFactor: number;
};

export const readingBudgetKeys = [
  'meter-gain',
  'meter-offset',
  'source-drift',
  'noise',
  'temperature-move',
  'temperature-log',
  'settling',
  'set-temperature',
] as const;
export type ReadingBudgetKey = (typeof readingBudgetKeys)[number];

export type ReadingBudget = {
  readonly terms: readonly { readonly key: ReadingBudgetKey; readonly standardA: number }[];
  readonly combinedA: number;
  readonly expandedA: number;
  /** Welch–Satterthwaite: only the noise has finite degrees of freedom (n − 1). */
  readonly effectiveDegreesOfFreedom: number;
};

/**
 * Uncertainty of one leakage reading after the GUM (JCGM 100), independent inputs, limits taken as
 * half-widths of rectangular distributions:
 *
 *     u² = (g·I/√3)² + (o/√3)² + (C·D/√3)² + (s/√n)² + u_T² + (C|α|√2·u_log/w)²
 *        + (residual/√3)² + (I·Ea/(R·T²)·ΔT_set/√3)²
 *     u_T = C|α||ΔT_f|/w/√3, or C·u(α)·|ΔT_f|/w where the induced current was subtracted
 *     residual = the mean of the start residual's exponential over the window
 *
 * Overhang and relaxation are not in it: no honest figure from one run, so the rest time is reported.
 *
 * @throws RangeError on a non-finite input, or a negative limit, window or count where meaningless
 * @example readingUncertaintyBudget(...).expandedA // 1.11784629e-6 for the worked 10 µA reading
 */
export function readingUncertaintyBudget(input: ReadingBudgetInput): ReadingBudget {
  const windowS = requirePositive(input.windowS, 'windowS');
  const capacitanceF = requirePositive(input.capacitanceF, 'capacitanceF');
  const count = requirePositive(input.effectiveCount, 'effectiveCount');
  const currentA = Math.abs(requireFinite(input.currentA, 'currentA'));
  const alphaVPerK = Math.abs(
    requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK'),
  );
  const rectangular = (limit: number, name: string): number =>
    requireNotNegative(Math.abs(limit), name) / Math.sqrt(3);
  const moveAPerVPerK =
    (capacitanceF * Math.abs(requireFinite(input.temperatureMoveK, 'temperatureMoveK'))) / windowS;
  const residualA = windowMeanResidual({
    startResidualA: input.startResidualA,
    timeConstantS: input.timeConstantS,
    windowStartS: input.windowStartS,
    windowS,
  });
  const sensitivityPerK = arrheniusSensitivity({
    temperatureC: input.setTemperatureC,
    activationEnergyJPerMol: leakageActivationEnergyJPerMol,
  });
  const standard: Record<ReadingBudgetKey, number> = {
    'meter-gain': rectangular(input.gainLimit * currentA, 'gainLimit'),
    'meter-offset': rectangular(input.offsetLimitA, 'offsetLimitA'),
    'source-drift': rectangular((capacitanceF * input.sourceDriftUvPerH) / 3.6e9, 'sourceDrift'),
    noise: requireNotNegative(input.readingSdA, 'readingSdA') / Math.sqrt(count),
    'temperature-move':
      input.entropicUncertaintyVPerK === null
        ? rectangular(moveAPerVPerK * alphaVPerK, 'temperatureMoveK')
        : moveAPerVPerK *
          requireNotNegative(input.entropicUncertaintyVPerK, 'entropicUncertaintyVPerK'),
    'temperature-log':
      (capacitanceF *
        alphaVPerK *
        Math.SQRT2 *
        requireNotNegative(input.logUncertaintyK, 'logUncertaintyK')) /
      windowS,
    settling: rectangular(residualA, 'residualA'),
    'set-temperature': rectangular(
      currentA * sensitivityPerK * input.setTemperatureLimitK,
      'setTemperatureLimitK',
    ),
  };
  const combinedA = Math.hypot(...Object.values(standard));
  return {
    terms: readingBudgetKeys.map((key) => ({ key, standardA: standard[key] })),
    combinedA,
    expandedA: requirePositive(input.coverageFactor, 'coverageFactor') * combinedA,
    effectiveDegreesOfFreedom:
      standard.noise === 0 || count <= 1
        ? Infinity
        : (combinedA / standard.noise) ** 4 * (count - 1),
  };
}
