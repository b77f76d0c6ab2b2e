import type { Placement } from '#shared/contracts/check.schemas.ts';
import { makeOffer } from '#shared/domain/availability/make-offer.ts';
import type { PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import { placeBooking } from '#shared/domain/availability/place-booking.ts';
import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import type { FacilityIndex } from '#shared/domain/facility/types.ts';

export type Judgement =
  | { readonly kind: 'placed'; readonly offer: Offer; readonly needsS: PhaseNeeds }
  | { readonly kind: 'unplaceable'; readonly sentence: string };

/**
 * Lays a placement out as it was sent and runs every check on it.
 *
 * @param context.untilMs nothing is known of the plan from then on: a slot must have ended by it
 * @param context.ignoreBookingId the booking that is moved or checked again
 */
export function judgePlacement(
  index: FacilityIndex,
  request: SlotRequest,
  placement: Placement,
  context: {
    readonly nowMs: number;
    readonly untilMs: number;
    readonly ignoreBookingId: number | null;
  },
): Judgement {
  const { chamberTag, joinsLoadId, paths, setTemperatureC } = placement;
  const chamber = index.facility.chambers.find(({ tag }) => tag === chamberTag);
  if (chamber === undefined) {
    return unplaceable(`There is no chamber ${chamberTag} at this site.`);
  }
  if (joinsLoadId !== null && chamber.loads.every(({ id }) => id !== joinsLoadId)) {
    return unplaceable(
      `Load ${joinsLoadId} is no longer planned in ${chamberTag}. Look for offers again.`,
    );
  }
  if (paths.length !== request.cellCount) {
    return unplaceable(
      `The placement has ${paths.length} paths for ${request.cellCount} cells. Choose one path for each cell.`,
    );
  }
  const placed = placeBooking(index, request, {
    chamberId: chamber.id,
    startMs: Date.parse(placement.startAt),
    joinsLoadId,
    setTemperatureC,
    paths: paths.map(({ meterRangeId, ...path }) => ({ ...path, rangeId: meterRangeId })),
    holdS: null,
    bookedPhases: null,
    nowMs: context.nowMs,
    ignoreBookingId: context.ignoreBookingId,
  });
  if (placed.outcome === 'refused') {
    return unplaceable(placed.sentence);
  }
  if (placed.facts.span.endMs > context.untilMs) {
    return unplaceable(
      `From this start no door in ${chamberTag} may be opened within the time that can be booked. Start at another time.`,
    );
  }
  return { kind: 'placed', offer: makeOffer(placed.facts), needsS: placed.needsS };
}

function unplaceable(sentence: string): Judgement {
  return { kind: 'unplaceable', sentence };
}
