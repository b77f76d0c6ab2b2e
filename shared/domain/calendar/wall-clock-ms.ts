import { DateTime } from 'luxon';

/**
 * The instant at which a site's clock shows a minute of a civil day. Where the clock is put back and
 * shows it twice, an opening takes the first and a closing the last; where the clock is put forward
 * and never shows it, the answer is the next minute that it does show.
 *
 * @param input.day `YYYY-MM-DD`
 * @param input.minute wall-clock minutes after midnight, 0-1440
 * @returns epoch ms
 * @throws RangeError when the day is not a calendar day
 * @example wallClockMs({ zone: 'Europe/Dublin', day: '2026-06-17', minute: 510, edge: 'opening' })
 * // 2026-06-17T07:30Z
 */
export function wallClockMs(input: {
  readonly zone: string;
  readonly day: string;
  readonly minute: number;
  readonly edge: 'opening' | 'closing';
}): number {
  const midnight = DateTime.fromISO(input.day, { zone: input.zone });
  if (!midnight.isValid) {
    throw new RangeError(`"${input.day}" is no calendar day; write it as YYYY-MM-DD.`);
  }
  for (let minute = input.minute; minute < 1440; minute += 1) {
    const shown = midnight.set({ hour: Math.floor(minute / 60), minute: minute % 60 });
    if (shown.hour * 60 + shown.minute === minute) {
      const possible = shown.getPossibleOffsets().map((moment) => moment.toMillis());
      return input.edge === 'opening' ? Math.min(...possible) : Math.max(...possible);
    }
  }
  return midnight.plus({ days: 1 }).startOf('day').toMillis();
}
