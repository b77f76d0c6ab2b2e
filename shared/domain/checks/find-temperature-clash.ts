import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import { mayMeet } from './may-meet.ts';

export type PhaseClash = {
  readonly load: Load;
  readonly own: PhaseSpan;
  readonly other: PhaseSpan;
};

/**
 * The first pair of phases that overlap at different set temperatures (compared in whole
 * millidegrees, as they are stored); null when there is none.
 *
 * @example findTemperatureClash(phases, []) // null
 */
export function findTemperatureClash(
  phases: readonly PhaseSpan[],
  others: readonly Load[],
): PhaseClash | null {
  for (const load of others) {
    if (!mayMeet(phases, load)) {
      continue;
    }
    for (const other of load.phases) {
      for (const own of phases) {
        if (
          overlaps(own, other) &&
          Math.round(own.setTemperatureC * 1000) !== Math.round(other.setTemperatureC * 1000)
        ) {
          return { load, own, other };
        }
      }
    }
  }
  return null;
}
