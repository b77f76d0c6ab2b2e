import { loadPhases } from '#shared/domain/hold-estimate/types.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';

/**
 * Phase by phase the longest of several needs, s: bookings of one load share its phases.
 *
 * @example longestNeeds([{ hold: 60 }, { hold: 120, soak: 60 }]) // { soak: 60, hold: 120 }
 */
export function longestNeeds(needs: readonly PhaseNeeds[]): PhaseNeeds {
  const longest: Partial<Record<(typeof loadPhases)[number], number>> = {};
  for (const phase of loadPhases) {
    const lengthS = Math.max(0, ...needs.map((need) => need[phase] ?? 0));
    if (lengthS > 0) {
      longest[phase] = lengthS;
    }
  }
  return longest;
}
