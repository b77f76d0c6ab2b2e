import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { twoPoleKernel } from './two-pole-kernel.ts';

/**
 * Current induced by a sudden change of the chamber temperature:
 *
 *     i = −C·α·ΔT·(e^(−t/τ_th) − e^(−t/τ_e))/(τ_th − τ_e)
 *
 * Derived here from one thermal and one electrical pole.
 *
 * @param input.stepK change of the chamber temperature, K
 * @param input.timeS time since the step, s
 * @returns A, positive into the cell
 * @throws RangeError on a non-finite input, C ≤ 0, or a negative time
 * @example
 * stepInducedCurrent({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, stepK: 1, timeS: 0,
 *   thermalTimeConstantS: 600, timeConstantS: 1400 }) // 0
 */
export function stepInducedCurrent(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly stepK: number;
  readonly timeS: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): number {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  requireFinite(input.stepK, 'stepK');
  const kernel = twoPoleKernel({
    timeS: input.timeS,
    firstS: input.thermalTimeConstantS,
    secondS: input.timeConstantS,
  });
  return kernel === 0
    ? 0
    : -input.capacitanceF * input.entropicCoefficientVPerK * input.stepK * kernel;
}
