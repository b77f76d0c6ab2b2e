import type { Span } from './types.ts';

/**
 * Does the outer span hold the whole inner one (equal ends allowed)?
 *
 * @example containsSpan({ startMs: 0, endMs: 10 }, { startMs: 5, endMs: 10 }) // true
 */
export function containsSpan(outer: Span, inner: Span): boolean {
  return outer.startMs <= inner.startMs && inner.endMs <= outer.endMs;
}
