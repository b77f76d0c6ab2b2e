import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Response of two first-order low-passes in series to a unit impulse:
 *
 *     g(t) = (e^(−t/a) − e^(−t/b)) / (a − b),   1/s;   a = b: t/a²·e^(−t/a)
 *
 * Symmetric in the two time constants and smooth where they are nearly equal (the difference is
 * taken through expm1). One of the two may be zero (a single low-pass).
 *
 * @param input.timeS time since the step, s, ≥ 0
 * @param input.firstS, input.secondS time constants, s, ≥ 0, not both zero
 * @throws RangeError on a negative or non-finite input, or when both time constants are zero
 * @example twoPoleKernel({ timeS: 600, firstS: 600, secondS: 600 }) // 0.000613132...
 */
export function twoPoleKernel(input: {
  readonly timeS: number;
  readonly firstS: number;
  readonly secondS: number;
}): number {
  const timeS = requireNotNegative(input.timeS, 'timeS');
  requireNotNegative(input.firstS, 'firstS');
  requireNotNegative(input.secondS, 'secondS');
  const slowS = requirePositive(Math.max(input.firstS, input.secondS), 'longer time constant');
  const fastS = Math.min(input.firstS, input.secondS);
  const slowDecay = Math.exp(-timeS / slowS);
  if (fastS === 0) {
    return slowDecay / slowS;
  }
  const exponent = (timeS * (slowS - fastS)) / (slowS * fastS);
  const shape = exponent === 0 ? 1 : -Math.expm1(-exponent) / exponent;
  return (slowDecay * timeS * shape) / (slowS * fastS);
}
