import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import type { Span } from './types.ts';

/**
 * Refuses a span that holds no time.
 *
 * @returns the span itself
 * @throws RangeError when an end is not finite or the end is not after the start
 * @example requireSpan({ startMs: 0, endMs: 1 }) // { startMs: 0, endMs: 1 }
 */
export function requireSpan(span: Span): Span {
  requireFinite(span.startMs, 'startMs');
  requireFinite(span.endMs, 'endMs');
  if (span.endMs <= span.startMs) {
    throw new RangeError(
      `A span must end after it starts; this one runs from ${span.startMs} to ${span.endMs}.`,
    );
  }
  return span;
}
