import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Time for a single exponential to come inside a tolerance:
 *
 *     t = τ·ln(|start|/tol),  0 when it starts inside
 *
 * Serves the current (start residual in A) and a temperature step (step in K) alike.
 *
 * @param input.startResidual start distance from the final value
 * @param input.tolerance same unit, > 0
 * @param input.timeConstantS τ, s
 * @returns s
 * @throws RangeError on a non-finite input, or a tolerance or τ not above zero
 * @example timeToTolerance({ startResidual: 1e-5, tolerance: 1e-6, timeConstantS: 1400 }) // 3223.61913
 */
export function timeToTolerance(input: {
  readonly startResidual: number;
  readonly tolerance: number;
  readonly timeConstantS: number;
}): number {
  const start = Math.abs(requireFinite(input.startResidual, 'startResidual'));
  const tolerance = requirePositive(input.tolerance, 'tolerance');
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  return start <= tolerance ? 0 : tauS * Math.log(start / tolerance);
}
