import { timeToTolerance } from './time-to-tolerance.ts';

/**
 * Time for a cell to come within a tolerance of the chamber after a sudden temperature step:
 *
 *     t = τ_th·ln(|ΔT|/tol)
 *
 * @param input.stepK ΔT, K
 * @param input.toleranceK tol, K
 * @returns s
 * @throws RangeError on a non-finite input, or a tolerance or τ_th not above zero
 * @example soakAfterStep({ stepK: 20, toleranceK: 0.1, thermalTimeConstantS: 644.859813 }) // 3416.67195
 */
export function soakAfterStep(input: {
  readonly stepK: number;
  readonly toleranceK: number;
  readonly thermalTimeConstantS: number;
}): number {
  return timeToTolerance({
    startResidual: input.stepK,
    tolerance: input.toleranceK,
    timeConstantS: input.thermalTimeConstantS,
  });
}
