import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { WorkingCalendar } from '#shared/domain/facility/types.ts';

const kept = new Map<string, { readonly hours: string; readonly index: CalendarIndex }>();

/** The calendar of a site with the days worked out so far; a change of its hours starts a new one. */
export function calendarOf(siteCode: string, calendar: WorkingCalendar): CalendarIndex {
  const hours = JSON.stringify(calendar);
  const known = kept.get(siteCode);
  if (known?.hours === hours) {
    return known.index;
  }
  const index = buildCalendarIndex(calendar);
  kept.set(siteCode, { hours, index });
  return index;
}
