import type { Span } from '#shared/domain/intervals/types.ts';
import { findCalendarDay } from './find-calendar-day.ts';
import { getCalendarDay } from './get-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

/**
 * Does a span lie wholly inside working hours? Hours that run to midnight and go on the next day
 * count as one stretch.
 *
 * @example isInWorkingHours(index, { startMs: sevenThirty, endMs: eight }) // false where work starts at 8
 */
export function isInWorkingHours(index: CalendarIndex, span: Span): boolean {
  let day = findCalendarDay(index, span.startMs);
  let coveredToMs = span.startMs;
  while (coveredToMs < span.endMs) {
    const reachedMs = coveredToMs;
    const holding = day.working.find(
      (hours) => hours.startMs <= reachedMs && reachedMs < hours.endMs,
    );
    if (holding === undefined) {
      return false;
    }
    coveredToMs = holding.endMs;
    if (coveredToMs >= day.span.endMs) {
      day = getCalendarDay(index, day.dayNumber + 1);
    }
  }
  return true;
}
