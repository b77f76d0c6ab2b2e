import type { Span } from './types.ts';

/**
 * The same time as an ordered list of spans that neither overlap nor touch. Empty spans vanish.
 *
 * @example mergeSpans([{ startMs: 5, endMs: 9 }, { startMs: 0, endMs: 5 }]) // [{ startMs: 0, endMs: 9 }]
 */
export function mergeSpans(spans: readonly Span[]): readonly Span[] {
  const ordered = spans
    .filter((span) => span.startMs < span.endMs)
    .toSorted((first, second) => first.startMs - second.startMs);
  const merged: Span[] = [];
  for (const span of ordered) {
    const last = merged.at(-1);
    if (last !== undefined && span.startMs <= last.endMs) {
      merged[merged.length - 1] = {
        startMs: last.startMs,
        endMs: Math.max(last.endMs, span.endMs),
      };
    } else {
      merged.push({ startMs: span.startMs, endMs: span.endMs });
    }
  }
  return merged;
}
