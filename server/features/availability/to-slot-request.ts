import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { MeasuredCellFigures, Tolerance } from '#shared/domain/hold-estimate/types.ts';
import { openEndMs } from './open-end.ts';
import type { GrantedDeviationRow, LotCellRow, LotRow } from './slot-request.repository.ts';

/** The share of wrong calls a screening may make in either direction. */
const wrongCallShare = 0.01;
const defaultBadToGoodRatio = 3;
const defaultTolerance: Tolerance = { kind: 'relative', fraction: 0.1 };
const highestHazardLevel = 7;

export type LotFacts = {
  readonly row: LotRow;
  readonly cells: readonly LotCellRow['cell'][];
  readonly deviations: readonly GrantedDeviationRow[];
};

/** What a lot still lacks before anything can be computed for it; empty when nothing. */
export function listMissing({ request, lot, cellType }: LotRow): string[] {
  return [
    ...(cellType === null ? ['the cell type'] : []),
    ...(lot.cellCount === null ? ['the number of cells'] : []),
    ...(request.setTempMdegc === null ? ['the set temperature'] : []),
  ];
}

/**
 * A lot as the search sees it; null where it is not complete enough (see `listMissing`).
 *
 * @param nowMs from when on it may start where the request names no day
 */
export function toSlotRequest(facts: LotFacts, nowMs: number): SlotRequest | null {
  const { request, lot, cellType } = facts.row;
  if (cellType === null || lot.cellCount === null || request.setTempMdegc === null) {
    return null;
  }
  return {
    requestId: request.id,
    kind: request.kind,
    grade: request.grade,
    cellTypeName: cellType.name,
    cellCount: lot.cellCount,
    cell: {
      cellClass: cellType.cellClass,
      format: cellType.format,
      chemistry: cellType.chemistry,
      capacityAh: cellType.capacityAh,
      stateOfChargePct: lot.stateOfChargePct,
      measured: toMeasured(cellType),
    },
    limits: {
      released: cellType.state === 'released',
      hazardLevel: cellType.hazardLevel ?? highestHazardLevel,
      minTemperatureC: cellType.minTestC,
      maxTemperatureC: cellType.maxTestC,
      minVoltageV: cellType.minV,
      maxVoltageV: cellType.maxV,
      openCircuitVoltageV: highestOcv(facts),
      energyWh: cellType.capacityAh * cellType.nominalV,
      maxHoldStateOfCharge: cellType.maxHoldStateOfChargePct,
    },
    tolerance: toTolerance(request),
    screening: {
      badToGoodRatio: request.badToGoodRatio ?? defaultBadToGoodRatio,
      falseAlarm: wrongCallShare,
      miss: wrongCallShare,
    },
    setTemperatureC: request.setTempMdegc / 1000,
    setToleranceK: request.setToleranceMk / 1000,
    earliestStartMs: request.earliestStartAt?.getTime() ?? nowMs,
    neededByMs: request.neededByAt?.getTime() ?? null,
    cellsReceived:
      facts.cells.length >= lot.cellCount &&
      facts.cells.every((cell) => cell.status !== 'announced'),
    cellsDamaged:
      lot.isDamaged ||
      facts.cells.some(
        (cell) =>
          cell.status === 'quarantined' || (cell.condition !== null && cell.condition !== 'good'),
      ),
    restedSinceMs: leastRestedMs(facts),
    deviations: facts.deviations.map((row) => ({
      id: row.id,
      code: row.checkCode,
      expiresAtMs: row.expiresAt?.getTime() ?? openEndMs,
    })),
  };
}

function toMeasured(cellType: NonNullable<LotRow['cellType']>): MeasuredCellFigures | null {
  const measured: MeasuredCellFigures = {
    capacitanceFPerAh: cellType.capacitanceFPerAh,
    resistanceOhm: cellType.resistanceOhm,
    thermalTimeConstantS: cellType.thermalTimeConstantS,
    entropicCoefficientVPerK: cellType.entropicCoefficientVPerK,
    massKg: cellType.massKg,
    surfaceM2: cellType.surfaceM2,
    selfDischargeAPerAh: cellType.selfDischargeAPerAh,
  };
  return Object.values(measured).every((figure) => figure === null) ? null : measured;
}

function toTolerance(request: LotRow['request']): Tolerance {
  if (request.toleranceKind === 'absolute' && request.toleranceCurrentA !== null) {
    return { kind: 'absolute', currentA: request.toleranceCurrentA };
  }
  return request.toleranceFraction === null
    ? defaultTolerance
    : { kind: 'relative', fraction: request.toleranceFraction };
}

/** The source must reach the highest of the lot; unknown unless every cell's is known. */
function highestOcv({ row, cells }: LotFacts): number | null {
  const known = cells.flatMap((cell) => cell.ocvV ?? []);
  return known.length > 0 && known.length >= (row.lot.cellCount ?? 0) ? Math.max(...known) : null;
}

/** The latest of what the lot states and what the cells' records say. */
function leastRestedMs({ row, cells }: LotFacts): number | null {
  const stated = row.lot.restedSinceAt?.getTime() ?? null;
  const recorded = cells.flatMap((cell) => cell.lastChargedAt?.getTime() ?? []);
  const isEveryCellKnown =
    recorded.length > 0 && recorded.length >= Math.max(row.lot.cellCount ?? 0, cells.length);
  if (stated === null && !isEveryCellKnown) {
    return null;
  }
  return Math.max(...recorded, ...(stated === null ? [] : [stated]));
}
