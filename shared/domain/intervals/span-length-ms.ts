import type { Span } from './types.ts';

/**
 * Length of a span, ms; zero for an empty one.
 *
 * @example spanLengthMs({ startMs: 5, endMs: 15 }) // 10
 */
export function spanLengthMs(span: Span): number {
  return Math.max(0, span.endMs - span.startMs);
}
