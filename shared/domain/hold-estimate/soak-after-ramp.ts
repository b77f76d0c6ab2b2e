import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { timeToTolerance } from './time-to-tolerance.ts';

export type SoakAfterRamp = {
  readonly rampS: number;
  /** Chamber minus cell at the end of the ramp, K, with sign. */
  readonly lagK: number;
  /** From the end of the ramp until the cell is within the tolerance, s. */
  readonly soakS: number;
  readonly totalS: number;
};

/**
 * Time for a cell to follow a chamber that ramps from T0 to T1 at a constant rate:
 *
 *     t_r = |T1 − T0|/r;   D = ±r·τ_th·(1 − e^(−t_r/τ_th)) + (T0 − Tc0)·e^(−t_r/τ_th)
 *     t = t_r + τ_th·ln(|D|/tol)
 *
 * @param input.rateKPerS r, K/s, magnitude
 * @param input.cellStartC Tc0, temperature of the cell when the ramp starts, °C
 * @throws RangeError on a non-finite input, or a rate, tolerance or τ_th not above zero
 * @example
 * soakAfterRamp({ fromC: 25, toC: 45, rateKPerS: 1 / 60, cellStartC: 25, toleranceK: 0.1,
 *   thermalTimeConstantS: 644.859813 }).totalS // 4107.1691
 */
export function soakAfterRamp(input: {
  readonly fromC: number;
  readonly toC: number;
  readonly rateKPerS: number;
  readonly cellStartC: number;
  readonly toleranceK: number;
  readonly thermalTimeConstantS: number;
}): SoakAfterRamp {
  const fromC = requireFinite(input.fromC, 'fromC');
  const changeK = requireFinite(input.toC, 'toC') - fromC;
  const rateKPerS = requirePositive(input.rateKPerS, 'rateKPerS');
  const tauS = requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const offsetK = fromC - requireFinite(input.cellStartC, 'cellStartC');
  const rampS = Math.abs(changeK) / rateKPerS;
  const built = -Math.expm1(-rampS / tauS);
  const lagK = Math.sign(changeK) * rateKPerS * tauS * built + offsetK * (1 - built);
  const soakS = timeToTolerance({
    startResidual: lagK,
    tolerance: input.toleranceK,
    timeConstantS: tauS,
  });
  return { rampS, lagK, soakS, totalS: rampS + soakS };
}
