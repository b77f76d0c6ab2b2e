import { DateTime } from 'luxon';

export const minuteMs = 60_000;
export const hourMs = 3_600_000;
export const dayMs = 86_400_000;

/** The calendar day some days from an instant, in a zone, as `YYYY-MM-DD`. */
export function dayFrom(atMs: number, plusDays: number, zone: string): string {
  return DateTime.fromMillis(atMs, { zone }).plus({ days: plusDays }).toFormat('yyyy-MM-dd');
}

/** A calendar day some months and days later. */
export function shiftDay(day: string, shift: { months?: number; days?: number }): string {
  return DateTime.fromISO(day, { zone: 'utc' }).plus(shift).toFormat('yyyy-MM-dd');
}

/** An hour of a calendar day at a site. */
export function instantOfDay(day: string, hour: number, zone: string): number {
  return DateTime.fromISO(day, { zone }).set({ hour }).toMillis();
}

/** The instant some days from now at a clock time of the site; weekends move on to the Monday. */
export function weekdayAt(
  nowMs: number,
  at: { readonly plusDays: number; readonly hour: number; readonly minute?: number },
  zone: string,
): number {
  let day = DateTime.fromMillis(nowMs, { zone }).plus({ days: at.plusDays });
  while (day.weekday > 5) {
    day = day.plus({ days: 1 });
  }
  return day.set({ hour: at.hour, minute: at.minute ?? 0, second: 0, millisecond: 0 }).toMillis();
}
