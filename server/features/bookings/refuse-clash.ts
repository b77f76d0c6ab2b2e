import type { Tx } from '#server/db/client.ts';
import { problem } from '#server/problem.ts';
import type { ProblemError } from '#server/problem.ts';
import type { Offer } from '#shared/domain/availability/types.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { isStill } from '#shared/domain/checks/is-still.ts';
import { formatTemperature } from '#shared/domain/checks/words/format-temperature.ts';
import { findPhaseClash, findTakenUnit } from './places.repository.ts';
import type { PhaseClashRow, TakenUnit } from './places.repository.ts';
import { unitsOf } from './units-of.ts';

/**
 * A quick look right after the locks: whoever lost the race for the places is told so at once, without
 * holding everybody else up with a whole reading of the chamber.
 */
export async function refuseQuickClash(
  tx: Tx,
  place: {
    readonly offer: Offer;
    readonly isStrictDoor: boolean;
    readonly calendar: CalendarIndex;
    /** The booking that is moved, and its load where it is alone in it. */
    readonly exceptBookingIds: readonly number[];
    readonly exceptLoadIds: readonly number[];
  },
): Promise<void> {
  const { offer, calendar } = place;
  const taken = await findTakenUnit(tx, unitsOf(offer.paths), offer, place.exceptBookingIds);
  if (taken !== null) {
    throw namesTaken(taken, calendar);
  }
  const joined = offer.joinsLoadId === null ? [] : [offer.joinsLoadId];
  const own = offer.phases.map((phase) => ({
    ...phase,
    isStill: isStill(phase.phase, place.isStrictDoor),
  }));
  const clash = await findPhaseClash(tx, offer.chamberId, own, [...joined, ...place.exceptLoadIds]);
  if (clash !== null) {
    throw namesPhase(clash, offer.chamberTag, calendar);
  }
}

function namesTaken(taken: TakenUnit, calendar: CalendarIndex): ProblemError {
  const by =
    taken.bookingId === null ? (taken.outageTitle ?? 'other work') : `booking ${taken.bookingId}`;
  return problem('booking.clash', {
    detail: `${taken.tag} is taken by ${by} until ${formatSiteTime(calendar, taken.until)}.`,
  });
}

function namesPhase(
  clash: PhaseClashRow,
  chamberTag: string,
  calendar: CalendarIndex,
): ProblemError {
  const until = formatSiteTime(calendar, clash.until);
  if (clash.setTempMdegc !== clash.ownTempMdegc) {
    const kept = formatTemperature(clash.setTempMdegc / 1000);
    const wanted = formatTemperature(clash.ownTempMdegc / 1000);
    return problem('booking.clash', {
      detail: `Load ${clash.loadId} keeps ${chamberTag} at ${kept} until ${until}; this slot wants ${wanted} in its ${clash.ownPhase}.`,
    });
  }
  return problem('booking.clash', {
    detail: `The ${clash.ownPhase} of this slot and the ${clash.phase} of load ${clash.loadId} in ${chamberTag} (until ${until}) would disturb each other.`,
  });
}
