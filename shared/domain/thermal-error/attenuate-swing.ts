import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * What is left of a temperature swing after the cell's mass and the electrical time constant:
 *
 *     A' = A/√((1+ω²τ_th²)(1+ω²τ_e²)),  ω = 2π/P;   A itself when the period is not known
 *
 * @param input.thermalTimeConstantS 0 when the sensor sits on the cell
 * @returns K
 * @throws RangeError on a negative or non-finite input, or a period not above zero
 * @example
 * attenuateSwing({ halfBandK: 0.1, periodS: null, thermalTimeConstantS: 600, timeConstantS: 1400 }) // 0.1
 */
export function attenuateSwing(input: {
  readonly halfBandK: number;
  readonly periodS: number | null;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): number {
  const halfBandK = requireNotNegative(input.halfBandK, 'halfBandK');
  const thermalS = requireNotNegative(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electricalS = requireNotNegative(input.timeConstantS, 'timeConstantS');
  if (input.periodS === null) {
    return halfBandK;
  }
  const angularRadPerS = (2 * Math.PI) / requirePositive(input.periodS, 'periodS');
  return (
    halfBandK /
    (Math.hypot(1, angularRadPerS * thermalS) * Math.hypot(1, angularRadPerS * electricalS))
  );
}
