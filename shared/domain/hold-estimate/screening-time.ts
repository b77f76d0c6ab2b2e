import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

export type ScreeningTime =
  | {
      readonly outcome: 'ok';
      readonly timeS: number;
      /** Z = z(1−α) + z(1−β). */
      readonly separationZ: number;
    }
  | {
      readonly outcome: 'impossible';
      readonly separationZ: number;
      /** Smallest difference this reading could ever tell, Z·s_m, A. */
      readonly smallestDifferenceA: number;
    };

/**
 * Time after which one reading tells bad cells from good ones at the wanted risks:
 *
 *     D(1 − x) = Z·√((a·x)² + s_m²),   x = e^(−t/τ),   Z = z(1−false alarm) + z(1−miss)
 *     P = D² − Z²a²,  R = D² − Z²s_m²,  x = R/(D² + √(D⁴ − P·R)),  t = −τ·ln x
 *
 * Impossible, whatever the time, when D ≤ Z·s_m. Valid while the window is much shorter than τ.
 *
 * @param input.differenceA D = |I_bad − I_good|, A
 * @param input.startSdA a, standard deviation of the unknown start current, A
 * @param input.readingSdA s_m, standard deviation of one window-mean reading, A
 * @param input.falseAlarm, input.miss probabilities, 0 < p < 0.5
 * @throws RangeError on a value out of its range
 * @example
 * screeningTime({ differenceA: 4e-5, startSdA: 1e-6 / 0.0943, readingSdA: 5e-7, falseAlarm: 0.01,
 *   miss: 0.01, timeConstantS: 1320 }) // { outcome: 'ok', timeS: 1064.75146, ... }
 */
export function screeningTime(input: {
  readonly differenceA: number;
  readonly startSdA: number;
  readonly readingSdA: number;
  readonly falseAlarm: number;
  readonly miss: number;
  readonly timeConstantS: number;
}): ScreeningTime {
  const differenceA = requirePositive(input.differenceA, 'differenceA');
  const startSdA = requireNotNegative(input.startSdA, 'startSdA');
  const readingSdA = requireNotNegative(input.readingSdA, 'readingSdA');
  const tauS = requirePositive(input.timeConstantS, 'timeConstantS');
  const separationZ = quantileOfRisk(input.falseAlarm) + quantileOfRisk(input.miss);
  if (differenceA <= separationZ * readingSdA) {
    return { outcome: 'impossible', separationZ, smallestDifferenceA: separationZ * readingSdA };
  }
  // Scaled by D, so that picoamperes and amperes are computed alike.
  const start = (separationZ * startSdA) / differenceA;
  const reading = (separationZ * readingSdA) / differenceA;
  const p = (1 - start) * (1 + start);
  const r = (1 - reading) * (1 + reading);
  const remaining = r / (1 + Math.sqrt(Math.max(0, 1 - p * r)));
  return { outcome: 'ok', separationZ, timeS: Math.max(0, -tauS * Math.log(remaining)) };
}

function quantileOfRisk(risk: number): number {
  if (!(risk > 0 && risk < 0.5)) {
    throw new RangeError(`A risk must lie between 0 and 0.5, not ${risk}.`);
  }
  return normalQuantile(1 - risk, 0, 1);
}
