import { subtractSpans } from './subtract-spans.ts';
import type { Span } from './types.ts';

/**
 * The free stretches of at least a given length inside a window, in order.
 *
 * @param minimumMs shortest gap of interest, ms
 * @example
 * findGaps({ window: { startMs: 0, endMs: 10 }, taken: [{ startMs: 3, endMs: 4 }], minimumMs: 4 })
 * // [{ startMs: 4, endMs: 10 }]
 */
export function findGaps(input: {
  readonly window: Span;
  readonly taken: readonly Span[];
  readonly minimumMs: number;
}): readonly Span[] {
  return subtractSpans(input.window, input.taken).filter(
    (gap) => gap.endMs - gap.startMs >= input.minimumMs,
  );
}
