import { needsOfEstimate } from '#shared/domain/availability/needs-of-estimate.ts';
import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import type { Facility, Load, LoadMember, TakenSpan } from '#shared/domain/facility/types.ts';

/** The facility with an offer booked: allocations taken, its load made or joined. */
export function applyOffer(
  facility: Facility,
  request: SlotRequest,
  booking: { readonly id: number; readonly offer: Offer; readonly state?: Load['state'] },
): Facility {
  const { id, offer } = booking;
  const member: LoadMember = {
    bookingId: id,
    cells: request.cellCount,
    energyWh: request.cellCount * request.limits.energyWh,
    needsS: needsOfEstimate(offer.estimate) ?? {},
  };
  const taken = offer.paths
    .flatMap(({ source, meter, position }) => [source.unitId, meter.unitId, position.unitId])
    .map((unitId): TakenSpan => ({
      unitId,
      startMs: offer.startMs,
      endMs: offer.endMs,
      by: 'booking',
      recordId: id,
      label: `booking ${id}`,
    }));
  return {
    ...facility,
    allocations: [...facility.allocations, ...taken],
    chambers: facility.chambers.map((chamber) => {
      if (chamber.id !== offer.chamberId) {
        return chamber;
      }
      const joined = chamber.loads.find((load) => load.id === offer.joinsLoadId);
      const load: Load =
        joined === undefined
          ? {
              id: 10_000 + id,
              state: booking.state ?? 'open',
              closesAtMs: null,
              setTemperatureC: offer.setTemperatureC,
              phases: offer.phases,
              members: [member],
            }
          : { ...joined, phases: offer.phases, members: [...joined.members, member] };
      const others = chamber.loads.filter((other) => other.id !== load.id);
      return { ...chamber, loads: [...others, load] };
    }),
  };
}
