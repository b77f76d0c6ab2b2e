import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Reading above which a cell is called bad, at a time after the match:
 *
 *     threshold = [I_good + D·z(1−α)/Z]·(1 − e^(−t/τ)),   Z = z(1−α) + z(1−β)
 *
 * @param input.goodCurrentA I_good, A
 * @param input.differenceA D, A
 * @param input.falseAlarm α, input.miss β, 0 < p < 0.5
 * @returns A
 * @throws RangeError on a value out of its range
 * @example
 * screeningThreshold({ goodCurrentA: 1e-5, differenceA: 4e-5, falseAlarm: 0.01, miss: 0.01,
 *   timeS: 1064.75146, timeConstantS: 1320 }) // 16.6092056e-6
 */
export function screeningThreshold(input: {
  readonly goodCurrentA: number;
  readonly differenceA: number;
  readonly falseAlarm: number;
  readonly miss: number;
  readonly timeS: number;
  readonly timeConstantS: number;
}): number {
  const goodA = requireNotNegative(input.goodCurrentA, 'goodCurrentA');
  const differenceA = requirePositive(input.differenceA, 'differenceA');
  for (const risk of [input.falseAlarm, input.miss]) {
    if (!(risk > 0 && risk < 0.5)) {
      throw new RangeError(`A risk must lie between 0 and 0.5, not ${risk}.`);
    }
  }
  const alarmZ = normalQuantile(1 - input.falseAlarm, 0, 1);
  const missZ = normalQuantile(1 - input.miss, 0, 1);
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  const reached = -Math.expm1(-requireNotNegative(input.timeS, 'timeS') / tauS);
  return (goodA + (differenceA * alarmZ) / (alarmZ + missZ)) * reached;
}
