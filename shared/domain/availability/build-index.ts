import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import type { Facility, FacilityIndex, TakenSpan } from '#shared/domain/facility/types.ts';

/**
 * A facility with the look-ups that checks and search need. It holds for the facility as given: when
 * anything changes, build a new one.
 *
 * @throws RangeError when the site's zone or hours make no sense
 * @example buildIndex(facility).chambers.get(3)?.tag // 'C03'
 */
export function buildIndex(facility: Facility): FacilityIndex {
  return {
    facility,
    calendar: buildCalendarIndex(facility.calendar),
    chambers: new Map(facility.chambers.map((chamber) => [chamber.id, chamber])),
    sources: new Map(facility.sourceChannels.map((channel) => [channel.unitId, channel])),
    meters: new Map(facility.meterChannels.map((channel) => [channel.unitId, channel])),
    positions: new Map(facility.positions.map((position) => [position.unitId, position])),
    taken: byUnit(facility.allocations),
    unavailable: byUnit(facility.unavailabilities),
  };
}

function byUnit(spans: readonly TakenSpan[]): ReadonlyMap<number, readonly TakenSpan[]> {
  const grouped = new Map<number, TakenSpan[]>();
  for (const span of spans.toSorted((first, second) => first.startMs - second.startMs)) {
    const unit = grouped.get(span.unitId);
    if (unit === undefined) {
      grouped.set(span.unitId, [span]);
    } else {
      unit.push(span);
    }
  }
  return grouped;
}
