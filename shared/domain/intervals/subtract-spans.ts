import { mergeSpans } from './merge-spans.ts';
import type { Span } from './types.ts';

/**
 * What is left of a span after others are taken out of it, in order.
 *
 * @example
 * subtractSpans({ startMs: 0, endMs: 10 }, [{ startMs: 3, endMs: 4 }])
 * // [{ startMs: 0, endMs: 3 }, { startMs: 4, endMs: 10 }]
 */
export function subtractSpans(span: Span, taken: readonly Span[]): readonly Span[] {
  const left: Span[] = [];
  let cursorMs = span.startMs;
  for (const hole of mergeSpans(taken)) {
    const endMs = Math.min(hole.startMs, span.endMs);
    if (cursorMs < endMs) {
      left.push({ startMs: cursorMs, endMs });
    }
    cursorMs = Math.max(cursorMs, hole.endMs);
  }
  if (cursorMs < span.endMs) {
    left.push({ startMs: cursorMs, endMs: span.endMs });
  }
  return left;
}
