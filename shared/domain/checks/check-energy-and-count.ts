import type { Load } from '#shared/domain/facility/types.ts';
import { makeResult } from './make-result.ts';
import { sumContents } from './sum-contents.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatFigure } from './words/format-figure.ts';

type Limit = {
  readonly place: string;
  readonly value: number;
  readonly limit: number;
  readonly unit: string;
};

/**
 * Do all cells together stay within the energy and count limit of the chamber, and within the energy
 * limit of its room where one is set, at every moment of the slot?
 *
 * @example checkEnergyAndCount(facts).sentence // 'C03 would hold 420 Wh of 400 Wh.'
 */
export function checkEnergyAndCount(facts: PlacementFacts): CheckResult {
  const limits = listLimits(facts);
  const worst = limits.toSorted((first, second) => use(second) - use(first))[0];
  if (worst === undefined) {
    return makeResult('energy-and-count', 'pass', 'No limit is set.');
  }
  const figures = `${formatFigure(worst.value)} of ${formatFigure(worst.limit)} ${worst.unit}`;
  return makeResult(
    'energy-and-count',
    use(worst) > 1 ? 'stop' : 'pass',
    `${worst.place} would hold ${figures}.`,
    {
      used: use(worst),
      evidence: limits.map((limit) => ({
        label: limit.unit === 'Wh' ? 'Energy' : 'Cells',
        value: `${formatFigure(limit.value)} of ${formatFigure(limit.limit)} ${limit.unit}`,
        source: limit.place,
      })),
      waysOut: [
        { kind: 'later-start', sentence: 'Start when fewer cells are inside.', subject: null },
        { kind: 'other-path', sentence: 'Choose another chamber.', subject: facts.chamber.tag },
        { kind: 'ask-safety', sentence: 'Ask the safety officer.', subject: worst.place },
      ],
    },
  );
}

function use(limit: Limit): number {
  return limit.limit > 0 ? limit.value / limit.limit : Infinity;
}

function listLimits(facts: PlacementFacts): readonly Limit[] {
  const { chamber, request, facility } = facts;
  const own = { cells: request.cellCount, energyWh: request.cellCount * request.limits.energyWh };
  const live = (loads: readonly Load[]): readonly Load[] =>
    loads.filter((load) => load.state !== 'cancelled');
  const inside = sumContents(live(chamber.loads), facts.span, facts.ignoreBookingId);
  const limits: Limit[] = [
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
