import { DateTime } from 'luxon';
import { findCalendarDay } from './find-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

const minuteMs = 60_000;

/**
 * An instant as people at the site say it.
 *
 * @param atMs epoch ms
 * @example formatSiteTime(index, Date.parse('2026-06-17T07:30:00Z')) // 'Wed 17 Jun 08:30' in Dublin
 */
export function formatSiteTime(index: CalendarIndex, atMs: number): string {
  const day = findCalendarDay(index, atMs);
  if (day.steadyOffsetMin === null) {
    const shown = DateTime.fromMillis(atMs, { zone: index.calendar.zone });
    return `${day.label} ${shown.toFormat('HH:mm')}`;
  }
  const minutes = Math.floor((atMs - day.span.startMs) / minuteMs);
  const two = (value: number): string => String(value).padStart(2, '0');
  return `${day.label} ${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
