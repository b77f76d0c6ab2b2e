import { getCalendarDay } from './get-calendar-day.ts';
import type { CalendarDay, CalendarIndex } from './types.ts';

const dayMs = 86_400_000;

/**
 * The civil day of the site that an instant falls on.
 *
 * @param atMs epoch ms
 * @throws RangeError when the instant is not finite
 * @example findCalendarDay(index, Date.parse('2026-06-17T23:30:00Z')).day // '2026-06-18' in Dublin
 */
export function findCalendarDay(index: CalendarIndex, atMs: number): CalendarDay {
  if (!Number.isFinite(atMs)) {
    throw new RangeError('An instant must be a finite number of milliseconds.');
  }
  const guess = getCalendarDay(index, Math.floor(atMs / dayMs));
  if (atMs < guess.span.startMs) {
    return getCalendarDay(index, guess.dayNumber - 1);
  }
  return atMs < guess.span.endMs ? guess : getCalendarDay(index, guess.dayNumber + 1);
}
