import { DateTime } from 'luxon';

/**
 * A calendar day as people say it, with its year.
 *
 * @param day `YYYY-MM-DD`
 * @throws RangeError when the day is not a calendar day
 * @example formatSiteDay('2026-06-17') // '17 Jun 2026'
 */
export function formatSiteDay(day: string): string {
  const civil = DateTime.fromISO(day, { zone: 'utc', locale: 'en-GB' });
  if (!civil.isValid) {
    throw new RangeError(`"${day}" is no calendar day; write it as YYYY-MM-DD.`);
  }
  return civil.toFormat('d LLL yyyy');
}
