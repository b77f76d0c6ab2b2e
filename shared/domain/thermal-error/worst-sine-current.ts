import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Bound on the induced current when only a band ±A of the chamber is known, not its period:
 *
 *     ω* = 1/√(τ_th·τ_e),   amplitude = C·|α|·A/(τ_th + τ_e)
 *
 * @returns amplitude in A and the period in s at which it is reached
 * @throws RangeError on a non-finite input, C or a time constant not above zero, or a negative band
 * @example
 * worstSineCurrent({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, amplitudeK: 0.1,
 *   thermalTimeConstantS: 600, timeConstantS: 1400 }).amplitudeA // 70e-6
 */
export function worstSineCurrent(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly amplitudeK: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): { readonly amplitudeA: number; readonly periodS: number } {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  requireNotNegative(input.amplitudeK, 'amplitudeK');
  const thermalS = requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electricalS = requirePositive(input.timeConstantS, 'timeConstantS');
  return {
    amplitudeA:
      (input.capacitanceF * Math.abs(input.entropicCoefficientVPerK) * input.amplitudeK) /
      (thermalS + electricalS),
    periodS: 2 * Math.PI * Math.sqrt(thermalS * electricalS),
  };
}
