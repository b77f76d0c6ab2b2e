import type { Span } from '#shared/domain/intervals/types.ts';

const dayMs = 86_400_000;
/** The longest hold is three days; the rest is for waiting over holidays. */
const longestSlotMs = 18 * dayMs;

/** The time around a start that can matter for one slot there. */
export function windowAround(startMs: number): Span {
  return { startMs: startMs - dayMs, endMs: startMs + longestSlotMs };
}
