import { DateTime } from 'luxon';

/**
 * Calendar days from one day to another; negative where the other is past.
 *
 * @param today `YYYY-MM-DD`
 * @param day `YYYY-MM-DD`
 * @throws RangeError when either is not a calendar day
 * @example daysUntil('2026-03-28', '2026-03-30') // 2, though the clocks change in between
 */
export function daysUntil(today: string, day: string): number {
  return civil(day).diff(civil(today), 'days').days;
}

function civil(day: string): DateTime {
  const parsed = DateTime.fromISO(day, { zone: 'utc' });
  if (!parsed.isValid || day.length !== 10) {
    throw new RangeError(`"${day}" is no calendar day; write it as YYYY-MM-DD.`);
  }
  return parsed;
}
