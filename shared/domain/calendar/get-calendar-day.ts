import { DateTime } from 'luxon';
import type { DayHours } from '#shared/domain/facility/types.ts';
import { mergeSpans } from '#shared/domain/intervals/merge-spans.ts';
import type { CalendarDay, CalendarIndex } from './types.ts';
import { wallClockMs } from './wall-clock-ms.ts';

const dayMs = 86_400_000;

/**
 * A civil day of the site by its number, worked out once per index.
 *
 * @param dayNumber days since 1970-01-01 by the site's own calendar
 * @example getCalendarDay(index, 20621).day // '2026-06-17'
 */
export function getCalendarDay(index: CalendarIndex, dayNumber: number): CalendarDay {
  const known = index.days.get(dayNumber);
  if (known !== undefined) {
    return known;
  }
  const made = makeDay(index, dayNumber);
  index.days.set(dayNumber, made);
  return made;
}

function makeDay(index: CalendarIndex, dayNumber: number): CalendarDay {
  const { zone, weekly, exceptions } = index.calendar;
  const civil = DateTime.fromMillis(dayNumber * dayMs, { zone: 'utc' });
  const day = civil.toFormat('yyyy-MM-dd');
  const start = DateTime.fromISO(day, { zone }).startOf('day');
  const startMs = start.toMillis();
  const endMs = wallClockMs({ zone, day, minute: 1440, edge: 'closing' });
  const hours: readonly DayHours[] =
    exceptions.find((exception) => exception.day === day)?.hours ?? weekly[civil.weekday] ?? [];
  const working = mergeSpans(
    hours.map(({ fromMin, toMin }) => ({
      startMs: wallClockMs({ zone, day, minute: fromMin, edge: 'opening' }),
      endMs: wallClockMs({ zone, day, minute: toMin, edge: 'closing' }),
    })),
  );
  return {
    day,
    dayNumber,
    span: { startMs, endMs },
    working,
    label: civil.setLocale('en-GB').toFormat('ccc d LLL'),
    steadyOffsetMin: endMs - startMs === dayMs ? start.offset : null,
  };
}
