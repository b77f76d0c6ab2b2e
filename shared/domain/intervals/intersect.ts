import type { Span } from './types.ts';

/**
 * The time two spans share, or `null` when they share none (touching shares none).
 *
 * @example intersect({ startMs: 0, endMs: 10 }, { startMs: 5, endMs: 20 }) // { startMs: 5, endMs: 10 }
 */
export function intersect(first: Span, second: Span): Span | null {
  const startMs = Math.max(first.startMs, second.startMs);
  const endMs = Math.min(first.endMs, second.endMs);
  return startMs < endMs ? { startMs, endMs } : null;
}
