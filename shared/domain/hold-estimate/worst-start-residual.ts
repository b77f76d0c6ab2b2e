import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Distance of the start current from the settled one when the sign of the mismatch is not known:
 * the worse of the two, |dV0|/R_s + I.
 *
 * @returns A
 * @throws RangeError on a non-finite input, R_s not above zero, or a negative current
 * @example worstStartResidual({ startMismatchV: 1e-5, seriesResistanceOhm: 0.1, steadyCurrentA: 1e-5 }) // 1.1e-4
 */
export function worstStartResidual(input: {
  readonly startMismatchV: number;
  readonly seriesResistanceOhm: number;
  readonly steadyCurrentA: number;
}): number {
  const mismatchV = Math.abs(requireFinite(input.startMismatchV, 'startMismatchV'));
  const seriesOhm = requirePositive(input.seriesResistanceOhm, 'seriesResistanceOhm');
  return mismatchV / seriesOhm + requireNotNegative(input.steadyCurrentA, 'steadyCurrentA');
}
