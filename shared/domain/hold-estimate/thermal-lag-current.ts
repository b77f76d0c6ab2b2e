import { stepInducedCurrent } from '#shared/domain/thermal-error/step-induced-current.ts';

/**
 * Current from the temperature difference that soaking left, a time after the match:
 *
 *     i(t) = −C·α·D_c·(e^(−t/τ_th) − e^(−t/τ_e))/(τ_th − τ_e)
 *
 * The same shape as a step of D_c at the match.
 *
 * @param input.lagK D_c, chamber minus cell at the match, K
 * @returns A, positive into the cell
 * @throws RangeError as `stepInducedCurrent`
 * @example
 * thermalLagCurrent({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, lagK: 0.1, timeS: 0,
 *   thermalTimeConstantS: 600, timeConstantS: 1400 }) // 0
 */
export function thermalLagCurrent(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly lagK: number;
  readonly timeS: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): number {
  return stepInducedCurrent({
    capacitanceF: input.capacitanceF,
    entropicCoefficientVPerK: input.entropicCoefficientVPerK,
    stepK: input.lagK,
    timeS: input.timeS,
    thermalTimeConstantS: input.thermalTimeConstantS,
    timeConstantS: input.timeConstantS,
  });
}
