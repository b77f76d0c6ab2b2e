import { findCalendarDay } from './find-calendar-day.ts';
import { getCalendarDay } from './get-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

/**
 * The last instant up to the given one at which work could still have ended: the instant itself
 * where it lies in working hours or at their end, otherwise the end of the hours before. Null when
 * the 400 days before have none.
 *
 * @param toMs epoch ms
 * @example previousWorkingMoment(index, saturdayNoon) // Friday 18:00
 */
export function previousWorkingMoment(index: CalendarIndex, toMs: number): number | null {
  const last = findCalendarDay(index, toMs).dayNumber;
  for (let dayNumber = last; dayNumber >= last - 400; dayNumber -= 1) {
    const hours = getCalendarDay(index, dayNumber).working.findLast((span) => span.startMs < toMs);
    if (hours !== undefined) {
      return Math.min(hours.endMs, toMs);
    }
  }
  return null;
}
