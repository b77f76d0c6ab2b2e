import { DateTime } from 'luxon';
import { getCalendarDay } from './get-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

const dayMs = 86_400_000;

/**
 * The instant at which a calendar day begins at the site, some days later if asked. A due date is
 * valid until `startOfDayMs(index, dueOn, 1)`.
 *
 * @param day `YYYY-MM-DD`
 * @param plusDays calendar days to add, whole
 * @throws RangeError when the day is not a calendar day
 * @example startOfDayMs(index, '2026-06-17', 1) // 2026-06-17T23:00Z in Dublin
 */
export function startOfDayMs(index: CalendarIndex, day: string, plusDays = 0): number {
  const civil = DateTime.fromISO(day, { zone: 'utc' });
  if (!civil.isValid || day.length !== 10) {
    throw new RangeError(`"${day}" is no calendar day; write it as YYYY-MM-DD.`);
  }
  return getCalendarDay(index, civil.toMillis() / dayMs + plusDays).span.startMs;
}
