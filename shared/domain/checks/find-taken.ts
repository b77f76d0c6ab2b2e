import type { TakenSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * The first thing that takes a unit during a span, apart from one booking; null when it is free.
 *
 * @param taken spans of one unit in order of start
 * @example findTaken(undefined, { startMs: 0, endMs: 1 }, null) // null
 */
export function findTaken(
  taken: readonly TakenSpan[] | undefined,
  span: Span,
  ignoreBookingId: number | null,
): TakenSpan | null {
  for (const candidate of taken ?? []) {
    if (candidate.startMs >= span.endMs) {
      return null;
    }
    const isOwn = candidate.by === 'booking' && candidate.recordId === ignoreBookingId;
    if (candidate.endMs > span.startMs && !(isOwn && ignoreBookingId !== null)) {
      return candidate;
    }
  }
  return null;
}
