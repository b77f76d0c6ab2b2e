import { IANAZone } from 'luxon';
import type { WorkingCalendar } from '#shared/domain/facility/types.ts';
import type { CalendarIndex } from './types.ts';

/**
 * Prepares a site's working hours for fast questions. Days are worked out once, on first use.
 *
 * @param calendar zone and hours; minutes are wall-clock minutes after midnight, 0-1440
 * @throws RangeError when the zone is not an IANA zone, or an hour span is empty or outside the day
 * @example buildCalendarIndex({ zone: 'Europe/Dublin', weekly: {}, exceptions: [] }).days.size // 0
 */
export function buildCalendarIndex(calendar: WorkingCalendar): CalendarIndex {
  if (!IANAZone.isValidZone(calendar.zone)) {
    throw new RangeError(`"${calendar.zone}" is no time zone; give one such as Europe/Dublin.`);
  }
  const spans = [
    ...Object.values(calendar.weekly).flat(),
    ...calendar.exceptions.flatMap((exception) => exception.hours),
  ];
  for (const { fromMin, toMin } of spans) {
    if (!(fromMin >= 0 && fromMin < toMin && toMin <= 1440)) {
      throw new RangeError(
        `Working hours must end after they start and lie within one day; got minute ${fromMin} to ${toMin}.`,
      );
    }
  }
  return { calendar, days: new Map() };
}
