import { ceilToStep } from '#shared/domain/quantities/ceil-to-step.ts';
import { bookingGridS } from './estimate-assumptions.ts';
import type { LoadPhase } from './types.ts';

/** A phase with its booked length. */
export type BookedPhase = { readonly phase: LoadPhase; readonly lengthS: number };

const edges: readonly LoadPhase[] = ['connect', 'wait', 'unload'];

/**
 * Brings phases onto the booking grid: connect, wait and unload are rounded up to it by themselves,
 * and the phases between them together, the difference going into the hold. A load that begins on
 * the grid then has its start, its end and its attended ends on it.
 *
 * @param phases in order, whole seconds
 * @param gridS the grid, s (15 min unless given)
 * @throws RangeError when there is no hold to take the difference
 * @example
 * roundPhasesToGrid([{ phase: 'connect', lengthS: 780 }, { phase: 'hold', lengthS: 1000 }])
 * // [{ phase: 'connect', lengthS: 900 }, { phase: 'hold', lengthS: 1800 }]
 */
export function roundPhasesToGrid(
  phases: readonly BookedPhase[],
  gridS: number = bookingGridS,
): readonly BookedPhase[] {
  const inner = phases.filter((phase) => !edges.includes(phase.phase));
  const innerS = inner.reduce((sum, phase) => sum + phase.lengthS, 0);
  const spareS = ceilToStep(innerS, gridS) - innerS;
  if (spareS > 0 && !inner.some((phase) => phase.phase === 'hold')) {
    throw new RangeError('A load without a hold cannot be brought onto the grid; add the hold.');
  }
  return phases.map(({ phase, lengthS }) => {
    if (edges.includes(phase)) {
      return { phase, lengthS: ceilToStep(lengthS, gridS) };
    }
    return { phase, lengthS: phase === 'hold' ? lengthS + spareS : lengthS };
  });
}
