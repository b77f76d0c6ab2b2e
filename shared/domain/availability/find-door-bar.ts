import { isStill } from '#shared/domain/checks/is-still.ts';
import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * The still phase of another load that forbids an open door during a span; null where the door may
 * open. Only asked where the door rule is strict.
 *
 * @example findDoorBar({ startMs: 0, endMs: 1 }, []) // null
 */
export function findDoorBar(door: Span, others: readonly Load[]): PhaseSpan | null {
  for (const load of others) {
    for (const phase of load.phases) {
      if (isStill(phase.phase, true) === true && overlaps(door, phase)) {
        return phase;
      }
    }
  }
  return null;
}
