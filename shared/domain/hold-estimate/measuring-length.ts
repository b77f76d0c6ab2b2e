import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Length of the measuring window by the noise rule:
 *
 *     w ≥ (s/u_target)²·δ·(1 + r1)/(1 − r1)
 *
 * @param input.readingSdA s, standard deviation of one reading, A
 * @param input.targetA u_target, A
 * @param input.sampleIntervalS δ, s
 * @param input.lagOneCorrelation r1, −1 < r1 < 1; 0 for independent readings
 * @returns s
 * @throws RangeError on a value out of its range
 * @example
 * measuringLength({ readingSdA: 1e-6, targetA: 1e-7, sampleIntervalS: 60, lagOneCorrelation: 0 }) // 6000
 */
export function measuringLength(input: {
  readonly readingSdA: number;
  readonly targetA: number;
  readonly sampleIntervalS: number;
  readonly lagOneCorrelation: number;
}): number {
  const ratio =
    requireNotNegative(input.readingSdA, 'readingSdA') / requirePositive(input.targetA, 'targetA');
  const correlation = input.lagOneCorrelation;
  if (!(correlation > -1 && correlation < 1)) {
    throw new RangeError(`lagOneCorrelation must lie between -1 and 1, not ${correlation}.`);
  }
  const intervalS = requirePositive(input.sampleIntervalS, 'sampleIntervalS');
  return ratio ** 2 * intervalS * ((1 + correlation) / (1 - correlation));
}
