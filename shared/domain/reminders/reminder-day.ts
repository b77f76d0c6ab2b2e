import { DateTime } from 'luxon';
import { wallClockMs } from '#shared/domain/calendar/wall-clock-ms.ts';

/**
 * The site's calendar day whose reminders may go out at an instant, or null before the hour at which
 * they do. Where the clock shows the hour twice the first counts, and where it is put forward past it
 * the next minute that it does show.
 *
 * @param input.zone IANA name
 * @param input.atMs epoch ms
 * @param input.hour wall-clock hour from which on reminders go out
 * @returns `YYYY-MM-DD`
 * @throws RangeError when the zone is unknown
 * @example
 * reminderDay({ zone: 'Europe/Dublin', atMs: Date.parse('2026-06-17T05:00:00Z'), hour: 6 });
 * // '2026-06-17': it is 06:00 there
 */
export function reminderDay(input: {
  readonly zone: string;
  readonly atMs: number;
  readonly hour: number;
}): string | null {
  const local = DateTime.fromMillis(input.atMs, { zone: input.zone });
  const day = local.toISODate();
  if (day === null) {
    throw new RangeError(`"${input.zone}" is no time zone.`);
  }
  const openMs = wallClockMs({
    zone: input.zone,
    day,
    minute: input.hour * 60,
    edge: 'opening',
  });
  return input.atMs < openMs ? null : day;
}
