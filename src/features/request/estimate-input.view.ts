import type { z } from 'zod';
import type { CellTypeDto, getEstimateBasis } from '#shared/contracts/registers.contract.ts';
import type { RequestFields } from '#shared/contracts/requests.contract.ts';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type { EstimateInput, SlotEstimate } from '#shared/domain/hold-estimate/types.ts';

export type Basis = z.output<typeof getEstimateBasis.response>;

/** The share of wrong calls a screening may make in either direction. */
const wrongCallShare = 0.01;

export type Need = 'cellType' | 'cellCount' | 'temperature';
export type LotEstimate =
  | { readonly kind: 'needs'; readonly needs: readonly Need[] }
  | { readonly kind: 'estimate'; readonly estimate: SlotEstimate };

type Wanted = Pick<RequestFields, 'kind' | 'tolerance' | 'badToGoodRatio' | 'setTemperatureC'>;

/** The estimate of one lot over the site's reference wiring: the same code as on the server. */
export function estimateLot(
  request: Wanted,
  lot: RequestFields['lots'][number],
  cellType: CellTypeDto | undefined,
  basis: Basis,
): LotEstimate {
  const { setTemperatureC } = request;
  const { cellCount } = lot;
  if (cellType === undefined || cellCount === null || setTemperatureC === null) {
    return {
      kind: 'needs',
      needs: [
        ...(cellType === undefined ? (['cellType'] as const) : []),
        ...(cellCount === null ? (['cellCount'] as const) : []),
        ...(setTemperatureC === null ? (['temperature'] as const) : []),
      ],
    };
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
    tolerance: request.tolerance,
    screening: {
      badToGoodRatio: request.badToGoodRatio,
      falseAlarm: wrongCallShare,
      miss: wrongCallShare,
    },
    wiring: basis.wiring,
    process: basis.process,
    learnedRatios: basis.learnedRatios,
  };
  return { kind: 'estimate', estimate: estimateSlot(input) };
}
