import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import { mayMeet } from './may-meet.ts';
import type { PhaseClash } from './find-temperature-clash.ts';
import { isStill } from './is-still.ts';

/**
 * The first pair of phases of which one must be still while the other disturbs, in either direction;
 * null when there is none.
 *
 * @param isStrict door rule of the chamber
 * @example findStillClash(phases, [], true) // null
 */
export function findStillClash(
  phases: readonly PhaseSpan[],
  others: readonly Load[],
  isStrict: boolean,
): PhaseClash | null {
  for (const load of others) {
    if (!mayMeet(phases, load)) {
      continue;
    }
    for (const other of load.phases) {
      const otherStill = isStill(other.phase, isStrict);
      if (otherStill === null) {
        continue;
      }
      for (const own of phases) {
        if (overlaps(own, other) && isStill(own.phase, isStrict) === !otherStill) {
          return { load, own, other };
        }
      }
    }
  }
  return null;
}
