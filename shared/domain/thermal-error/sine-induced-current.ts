import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Amplitude and phase of the current induced by a sinusoidal chamber temperature A·sin(ωt):
 *
 *     amplitude = C·|α|·A·ω/√((1+ω²τ_th²)(1+ω²τ_e²)),   ω = 2π/P
 *     phase     = π/2 − atan ωτ_th − atan ωτ_e  (+π when α > 0)
 *
 * @returns amplitude in A and phase in rad, ahead of the temperature
 * @throws RangeError on a non-finite input, C or period not above zero, or a negative amplitude
 * @example
 * sineInducedCurrent({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, amplitudeK: 0.1,
 *   periodS: 600, thermalTimeConstantS: 600, timeConstantS: 1400 }).amplitudeA // 15.6812364e-6
 */
export function sineInducedCurrent(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly amplitudeK: number;
  readonly periodS: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): { readonly amplitudeA: number; readonly phaseRad: number } {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  requireNotNegative(input.amplitudeK, 'amplitudeK');
  const angularRadPerS = (2 * Math.PI) / requirePositive(input.periodS, 'periodS');
  const thermal =
    angularRadPerS * requireNotNegative(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electrical = angularRadPerS * requireNotNegative(input.timeConstantS, 'timeConstantS');
  const amplitudeA =
    (input.capacitanceF *
      Math.abs(input.entropicCoefficientVPerK) *
      input.amplitudeK *
      angularRadPerS) /
    (Math.hypot(1, thermal) * Math.hypot(1, electrical));
  const lead = Math.PI / 2 - Math.atan(thermal) - Math.atan(electrical);
  return {
    amplitudeA,
    phaseRad: input.entropicCoefficientVPerK > 0 ? lead + Math.PI : lead,
  };
}
