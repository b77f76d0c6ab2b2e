import type { Span } from './types.ts';

/**
 * Do two half-open spans share an instant? Touching spans do not: a.start < b.end and b.start < a.end.
 * An empty span overlaps nothing.
 *
 * @example overlaps({ startMs: 0, endMs: 10 }, { startMs: 10, endMs: 20 }) // false
 */
export function overlaps(first: Span, second: Span): boolean {
  return Math.max(first.startMs, second.startMs) < Math.min(first.endMs, second.endMs);
}
