import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

export type SettledTest = {
  readonly isSettled: boolean;
  /** Residual of one exponential, |τ·slope|, A. */
  readonly residualA: number;
  /** Its standard error, τ·SE(slope), A. */
  readonly standardErrorA: number;
  readonly toleranceA: number;
};

/**
 * Settled test on measured readings: the residual of one exponential is −τ·di/dt, so
 *
 *     |τ·slope| + z·τ·SE(slope) ≤ tolerance,   SE = σ/(δ·√(n(n² − 1)/12))
 *
 * with the slope of a straight line through n equally spaced readings.
 *
 * @param input.slopeAPerS slope of the line, A/s
 * @param input.readingSdA σ of one reading, A
 * @param input.sampleIntervalS δ, s
 * @param input.readingCount n, at least 3
 * @param input.coverageZ z, ≥ 0 (1.645 for one-sided 95 %)
 * @throws RangeError on a non-finite input, τ, δ or tolerance not above zero, or fewer than 3 readings
 * @example
 * settledTest({ slopeAPerS: 1e-10, readingSdA: 0, sampleIntervalS: 10, readingCount: 60,
 *   timeConstantS: 1400, coverageZ: 1.645, toleranceA: 1e-6 }).isSettled // true
 */
export function settledTest(input: {
  readonly slopeAPerS: number;
  readonly readingSdA: number;
  readonly sampleIntervalS: number;
  readonly readingCount: number;
  readonly timeConstantS: number;
  readonly coverageZ: number;
  readonly toleranceA: number;
}): SettledTest {
  const count = requireFinite(input.readingCount, 'readingCount');
  if (!Number.isInteger(count) || count < 3) {
    throw new RangeError(`A settled test needs at least 3 readings, not ${count}.`);
  }
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  const toleranceA = requirePositive(input.toleranceA, 'toleranceA');
  const spreadS =
    requirePositive(input.sampleIntervalS, 'sampleIntervalS') *
    Math.sqrt((count * (count ** 2 - 1)) / 12);
  const residualA = Math.abs(tauS * requireFinite(input.slopeAPerS, 'slopeAPerS'));
  const standardErrorA = (tauS * requireNotNegative(input.readingSdA, 'readingSdA')) / spreadS;
  const coverageZ = requireNotNegative(input.coverageZ, 'coverageZ');
  return {
    isSettled: residualA + coverageZ * standardErrorA <= toleranceA,
    residualA,
    standardErrorA,
    toleranceA,
  };
}
