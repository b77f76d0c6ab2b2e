import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Standard deviation of one window-mean reading:
 *
 *     s_m = √(σ²/n + (resolution/√12)²),   n = window/δ, at least 1
 *
 * Averaging lowers the noise but not the step of the display. Readings are taken as independent.
 *
 * @param input.noiseA σ of one reading, A
 * @param input.resolutionA smallest displayed step, A
 * @param input.sampleIntervalS δ, s
 * @param input.windowS length of the measuring window, s
 * @returns A
 * @throws RangeError on a negative noise or resolution, or an interval or window not above zero
 * @example
 * readingDeviation({ noiseA: 1e-6, resolutionA: 0, sampleIntervalS: 60, windowS: 3600 }) // 1.29e-7
 */
export function readingDeviation(input: {
  readonly noiseA: number;
  readonly resolutionA: number;
  readonly sampleIntervalS: number;
  readonly windowS: number;
}): number {
  const noiseA = requireNotNegative(input.noiseA, 'noiseA');
  const resolutionA = requireNotNegative(input.resolutionA, 'resolutionA');
  const intervalS = requirePositive(input.sampleIntervalS, 'sampleIntervalS');
  const count = Math.max(1, requirePositive(input.windowS, 'windowS') / intervalS);
  return Math.hypot(noiseA / Math.sqrt(count), resolutionA / Math.sqrt(12));
}
