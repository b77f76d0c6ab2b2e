import type { Load } from '#shared/domain/facility/types.ts';
import { sumContents } from './sum-contents.ts';
import type { PlacementFacts } from './types.ts';

export type ContentLimit = {
  readonly place: string;
  readonly value: number;
  readonly limit: number;
  readonly unit: 'Wh' | 'cells';
};

/**
 * What the chamber and its room would hold at most during a slot, with this booking in it, beside
 * what they may hold.
 *
 * @example listContentLimits(facts)[0] // { place: 'C03', value: 420, limit: 400, unit: 'Wh' }
 */
export function listContentLimits(facts: PlacementFacts): readonly ContentLimit[] {
  const { chamber, request, facility } = facts;
  const own = { cells: request.cellCount, energyWh: request.cellCount * request.limits.energyWh };
  const live = (loads: readonly Load[]): readonly Load[] =>
    loads.filter((load) => load.state !== 'cancelled');
  const inside = sumContents(live(chamber.loads), facts.span, facts.ignoreBookingId);
  const limits: ContentLimit[] = [
    {
      place: chamber.tag,
      value: inside.energyWh + own.energyWh,
      limit: chamber.maxEnergyWh,
      unit: 'Wh',
    },
    { place: chamber.tag, value: inside.cells + own.cells, limit: chamber.maxCells, unit: 'cells' },
  ];
  const room = facility.rooms?.find((candidate) => candidate.name === chamber.roomName);
  if (room !== undefined) {
    const loads = facility.chambers
      .filter((candidate) => candidate.roomName === room.name)
      .flatMap((candidate) => live(candidate.loads));
    const together = sumContents(loads, facts.span, facts.ignoreBookingId);
    limits.push({
      place: room.name,
      value: together.energyWh + own.energyWh,
      limit: room.maxEnergyWh,
      unit: 'Wh',
    });
  }
  return limits;
}
