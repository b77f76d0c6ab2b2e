import type { z } from 'zod';
import type { CellTypeDto, getEstimateBasis } from '#shared/contracts/registers.contract.ts';
import type { LotFields } from '#shared/contracts/requests.contract.ts';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type { EstimateInput, SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import type { LooseFields } from './loose-fields.view.ts';

export type Basis = z.output<typeof getEstimateBasis.response>;

/** The share of wrong calls a screening may make in either direction. */
const wrongCallShare = 0.01;
/** What the estimate of the other kind takes for an aim that plays no part in it. */
const unusedTolerance = { kind: 'relative', fraction: 0.1 } as const;
const unusedRatio = 3;

export type Need = 'cellType' | 'cellCount' | 'temperature' | 'tolerance' | 'ratio';
export type LotEstimate =
  | { readonly kind: 'needs'; readonly needs: readonly Need[] }
  | { readonly kind: 'estimate'; readonly input: EstimateInput; readonly estimate: SlotEstimate };

type Wanted = Omit<LooseFields, 'lots'>;
type Lot = Pick<LotFields, 'cellCount' | 'stateOfChargePct'>;

function listNeeds(request: Wanted, lot: Lot, cellType: CellTypeDto | undefined): readonly Need[] {
  const isScreening = request.kind === 'screening';
  const open: readonly (readonly [boolean, Need])[] = [
    [cellType === undefined, 'cellType'],
    [lot.cellCount === null, 'cellCount'],
    [request.setTemperatureC === null, 'temperature'],
    [!isScreening && request.tolerance === null, 'tolerance'],
    [isScreening && request.badToGoodRatio === null, 'ratio'],
  ];
  return open.filter(([isOpen]) => isOpen).map(([, need]) => need);
}

/** The estimate of one lot over the site's reference wiring: the same code as on the server. */
export function estimateLot(
  request: Wanted,
  lot: Lot,
  cellType: CellTypeDto | undefined,
  basis: Basis,
): LotEstimate {
  const needs = listNeeds(request, lot, cellType);
  const { setTemperatureC } = request;
  const { cellCount } = lot;
  if (
    needs.length > 0 ||
    cellType === undefined ||
    cellCount === null ||
    setTemperatureC === null
  ) {
    return { kind: 'needs', needs };
  }
  const input: EstimateInput = {
    kind: request.kind,
    cellCount,
    cell: {
      cellClass: cellType.cellClass,
      format: cellType.format,
      chemistry: cellType.chemistry,
      capacityAh: cellType.capacityAh,
      stateOfChargePct: lot.stateOfChargePct,
      measured: cellType.measured,
    },
    holderFactor: basis.holderFactor,
    setTemperatureC,
    chamber: basis.chamber,
    tolerance: request.tolerance ?? unusedTolerance,
    screening: {
      badToGoodRatio: request.badToGoodRatio ?? unusedRatio,
      falseAlarm: wrongCallShare,
      miss: wrongCallShare,
    },
    wiring: basis.wiring,
    process: basis.process,
    learnedRatios: basis.learnedRatios,
  };
  return { kind: 'estimate', input, estimate: estimateSlot(input) };
}
