import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { twoPoleKernel } from './two-pole-kernel.ts';

/**
 * Current induced by a chamber temperature that has been rising at a constant rate for a time:
 *
 *     i = −C·α·r·[1 − (τ_th·e^(−t/τ_th) − τ_e·e^(−t/τ_e))/(τ_th − τ_e)]  →  −C·α·r
 *
 * Positive current pushes charge into the cell; warming a cell with α > 0 raises its open-circuit
 * voltage and the source charges less. Derived here from one thermal and one electrical pole.
 *
 * @param input.timeS time since the ramp began, s; leave out for the steady value
 * @returns A
 * @throws RangeError on a non-finite input, C ≤ 0, or time constants not above zero
 * @example
 * rampInducedCurrent({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, rateKPerS: 0.1 / 3600,
 *   thermalTimeConstantS: 600, timeConstantS: 1400 }) // −38.888...e-6
 */
export function rampInducedCurrent(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly rateKPerS: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
  readonly timeS?: number;
}): number {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  requireFinite(input.rateKPerS, 'rateKPerS');
  requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  requirePositive(input.timeConstantS, 'timeConstantS');
  const steadyA = -input.capacitanceF * input.entropicCoefficientVPerK * input.rateKPerS;
  if (input.timeS === undefined) {
    return steadyA;
  }
  const timeS = requireNotNegative(input.timeS, 'timeS');
  // (a·e^(−t/a) − b·e^(−t/b))/(a−b) = e^(−t/a) + b·(e^(−t/a) − e^(−t/b))/(a−b), smooth at a = b.
  const remaining =
    Math.exp(-timeS / input.thermalTimeConstantS) +
    input.timeConstantS *
      twoPoleKernel({
        timeS,
        firstS: input.thermalTimeConstantS,
        secondS: input.timeConstantS,
      });
  return steadyA * (1 - remaining);
}
