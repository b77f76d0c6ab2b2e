import { requireFinite } from '#shared/domain/quantities/require-finite.ts';

/**
 * Early forecast of the settled current from three equally spaced readings of one exponential:
 *
 *     I∞ = (i1·i3 − i2²)/(i1 + i3 − 2·i2)
 *
 * Sensitive to noise: a rough guess for the operator, never a result.
 *
 * @returns A, or `null` when the readings lie on a straight line (no exponential to extrapolate)
 * @throws RangeError when a reading is not finite
 * @example steadyCurrentFromThreeReadings({ firstA: 5, secondA: 3, thirdA: 2 }) // 1
 */
export function steadyCurrentFromThreeReadings(input: {
  readonly firstA: number;
  readonly secondA: number;
  readonly thirdA: number;
}): number | null {
  const firstA = requireFinite(input.firstA, 'firstA');
  const secondA = requireFinite(input.secondA, 'secondA');
  const thirdA = requireFinite(input.thirdA, 'thirdA');
  const curvature = firstA - secondA - (secondA - thirdA);
  return curvature === 0 ? null : (firstA * thirdA - secondA ** 2) / curvature;
}
