import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Current a time after the source was matched to the cell:
 *
 *     i(t) = I + (dV0/R_s − I)·e^(−t/τ)
 *
 * @param input.steadyCurrentA I, A
 * @param input.startMismatchV dV0 = source − open-circuit voltage at the start, V, with sign
 * @param input.seriesResistanceOhm R_s, Ω
 * @param input.timeConstantS τ, s
 * @param input.timeS t, s
 * @returns A, positive into the cell
 * @throws RangeError on a non-finite input, R_s or τ not above zero, or a negative time
 * @example
 * settlingCurrent({ steadyCurrentA: 1e-5, startMismatchV: 1e-5, seriesResistanceOhm: 0.1,
 *   timeConstantS: 1400, timeS: 1400 }) // 43.1091497e-6
 */
export function settlingCurrent(input: {
  readonly steadyCurrentA: number;
  readonly startMismatchV: number;
  readonly seriesResistanceOhm: number;
  readonly timeConstantS: number;
  readonly timeS: number;
}): number {
  const steadyA = requireFinite(input.steadyCurrentA, 'steadyCurrentA');
  const startA =
    requireFinite(input.startMismatchV, 'startMismatchV') /
    requirePositive(input.seriesResistanceOhm, 'seriesResistanceOhm');
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  return steadyA + (startA - steadyA) * Math.exp(-requireNotNegative(input.timeS, 'timeS') / tauS);
}
