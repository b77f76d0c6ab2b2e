import { DateTime } from 'luxon';

/** The week around a day at the site, Monday to Monday, as instants. */
export function weekRange(
  day: string,
  zone: string,
): { firstDay: string; from: string; to: string } {
  const asked = DateTime.fromISO(day, { zone });
  const first = (asked.isValid ? asked : DateTime.fromMillis(0, { zone })).startOf('week');
  return {
    firstDay: first.toFormat('yyyy-MM-dd'),
    from: new Date(first.toMillis()).toISOString(),
    to: new Date(first.plus({ weeks: 1 }).toMillis()).toISOString(),
  };
}

export function shiftWeek(day: string, weeks: number): string {
  return DateTime.fromISO(day, { zone: 'utc' }).plus({ weeks }).toFormat('yyyy-MM-dd');
}
