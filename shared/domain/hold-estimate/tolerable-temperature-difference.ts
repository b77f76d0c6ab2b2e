import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Temperature difference that matters for a current tolerance: dT = I_tol·τ_th/(C·|α|).
 *
 * @returns K, or `null` when dU/dT is zero (no difference matters)
 * @throws RangeError on a non-finite input, or a tolerance, C or τ_th not above zero
 * @example
 * tolerableTemperatureDifference({ toleranceA: 5e-7, thermalTimeConstantS: 600, capacitanceF: 14000,
 *   entropicCoefficientVPerK: 1e-4 }) // 0.000214285714
 */
export function tolerableTemperatureDifference(input: {
  readonly toleranceA: number;
  readonly thermalTimeConstantS: number;
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
}): number | null {
  const numerator =
    requirePositive(input.toleranceA, 'toleranceA') *
    requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const chargePerKelvin =
    requirePositive(input.capacitanceF, 'capacitanceF') *
    Math.abs(requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK'));
  return chargePerKelvin === 0 ? null : numerator / chargePerKelvin;
}
