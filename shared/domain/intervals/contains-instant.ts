import type { Span } from './types.ts';

/**
 * Does the half-open span hold the instant? The start belongs to it, the end does not.
 *
 * @example containsInstant({ startMs: 0, endMs: 10 }, 10) // false
 */
export function containsInstant(span: Span, instantMs: number): boolean {
  return span.startMs <= instantMs && instantMs < span.endMs;
}
