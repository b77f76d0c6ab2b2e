import { findCalendarDay } from './find-calendar-day.ts';
import type { CalendarIndex } from './types.ts';

/**
 * The calendar day at the site, `YYYY-MM-DD`.
 *
 * @param atMs epoch ms
 * @example siteDay(index, Date.parse('2026-06-17T23:30:00Z')) // '2026-06-18' in Dublin
 */
export function siteDay(index: CalendarIndex, atMs: number): string {
  return findCalendarDay(index, atMs).day;
}
