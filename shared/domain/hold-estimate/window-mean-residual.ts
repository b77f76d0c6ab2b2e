import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * What unfinished settling leaves in the mean over a measuring window [t1, t1 + w]:
 *
 *     residual = start·(τ/w)·e^(−t1/τ)·(1 − e^(−w/τ))
 *
 * @param input.startResidualA dV0/R_s − I, A, with sign
 * @param input.windowStartS t1, s after the match
 * @param input.windowS w, s
 * @returns A
 * @throws RangeError on a non-finite input, a negative start, or w or τ not above zero
 * @example
 * windowMeanResidual({ startResidualA: 9e-5, timeConstantS: 1400, windowStartS: 5600,
 *   windowS: 1800 }) // 0.92765573e-6
 */
export function windowMeanResidual(input: {
  readonly startResidualA: number;
  readonly timeConstantS: number;
  readonly windowStartS: number;
  readonly windowS: number;
}): number {
  const startA = requireFinite(input.startResidualA, 'startResidualA');
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  const windowStartS = requireNotNegative(input.windowStartS, 'windowStartS');
  const windowS = requirePositive(input.windowS, 'windowS');
  return startA * (tauS / windowS) * Math.exp(-windowStartS / tauS) * -Math.expm1(-windowS / tauS);
}
