import type { Offer } from '#shared/domain/availability/types.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { formatLength } from '#shared/domain/checks/words/format-length.ts';
import { containsSpan } from '#shared/domain/intervals/contains-span.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';

/** A wait shorter than this is nothing particular. */
const noteworthyWaitS = 1800;
const dayMs = 86_400_000;

/**
 * What is particular about a slot, in short sentences: the load it joins, when it settles, how long it
 * waits for staff, how it lies to the date it is needed by. Empty when nothing is.
 */
export function remarkOn(
  offer: Pick<Offer, 'joinsLoadId' | 'phases' | 'waitS' | 'endMs'>,
  calendar: CalendarIndex,
  neededByMs: number | null,
): string {
  const settling = settlingSpan(offer);
  const sentences = [
    offer.joinsLoadId === null ? null : `Joins load ${offer.joinsLoadId}.`,
    settling === null ? null : settlesWhen(calendar, settling),
    offer.waitS < noteworthyWaitS
      ? null
      : `Waits ${formatLength(offer.waitS)} for the door before it is unloaded.`,
    neededByMs === null ? null : nearness(offer.endMs, neededByMs),
  ];
  return sentences.filter((sentence) => sentence !== null).join(' ');
}

function settlingSpan(offer: Pick<Offer, 'phases'>): Span | null {
  const still = offer.phases.filter(({ phase }) => phase === 'hold' || phase === 'measure');
  const [first, last] = [still[0], still.at(-1)];
  return first === undefined || last === undefined
    ? null
    : { startMs: first.startMs, endMs: last.endMs };
}

/** Nothing to say while somebody is there; a closed day in between is a weekend or holiday. */
function settlesWhen(calendar: CalendarIndex, settling: Span): string | null {
  const first = findCalendarDay(calendar, settling.startMs);
  const last = findCalendarDay(calendar, settling.endMs);
  const nights = last.dayNumber - first.dayNumber;
  if (nights < 1) {
    return first.working.some((hours) => containsSpan(hours, settling))
      ? null
      : 'Settles after working hours.';
  }
  const passesClosedDay = Array.from({ length: nights - 1 }, (_, step) =>
    findCalendarDay(calendar, first.span.endMs + step * dayMs + dayMs / 2),
  ).some((day) => day.working.length === 0 && overlaps(day.span, settling));
  if (passesClosedDay) {
    return 'Settles over days on which nobody works.';
  }
  return nights === 1 ? 'Settles overnight.' : `Settles over ${nights} nights.`;
}

function nearness(endMs: number, neededByMs: number): string {
  const lengthS = Math.abs(neededByMs - endMs) / 1000;
  const length =
    lengthS >= 2 * (dayMs / 1000)
      ? `${Math.floor(lengthS / (dayMs / 1000))} days`
      : formatLength(lengthS);
  return endMs <= neededByMs
    ? `Ends ${length} before it is needed.`
    : `Ends ${length} after it is needed.`;
}
