import { findCalendarDay } from './find-calendar-day.ts';
import { getCalendarDay } from './get-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

/**
 * The first instant from the given one on that lies in working hours; null when the next 400 days
 * have none.
 *
 * @param fromMs epoch ms
 * @example nextWorkingMoment(index, saturdayNoon) // Monday 08:00
 */
export function nextWorkingMoment(index: CalendarIndex, fromMs: number): number | null {
  const first = findCalendarDay(index, fromMs).dayNumber;
  for (let dayNumber = first; dayNumber <= first + 400; dayNumber += 1) {
    const hours = getCalendarDay(index, dayNumber).working.find((span) => span.endMs > fromMs);
    if (hours !== undefined) {
      return Math.max(hours.startMs, fromMs);
    }
  }
  return null;
}
