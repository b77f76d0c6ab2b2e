import type { Chamber, FacilityPolicy } from '#shared/domain/facility/types.ts';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type { SlotEstimate, Wiring } from '#shared/domain/hold-estimate/types.ts';
import type { SlotRequest } from './types.ts';

/** A re-cabled path costs five minutes of connect; the search offers wired paths only. */
const recableMinPerPath = 5;

/**
 * The estimate of a request in a chamber over one wiring and holder.
 *
 * @example estimatePath({ request, policy, chamber, setTemperatureC: 45, wiring, holderFactor: 1 }).outcome
 */
export function estimatePath(input: {
  readonly request: SlotRequest;
  readonly policy: FacilityPolicy;
  readonly chamber: Pick<Chamber, 'idleTemperatureC' | 'rampKPerMin'>;
  readonly setTemperatureC: number;
  readonly wiring: Wiring;
  readonly holderFactor: number;
}): SlotEstimate {
  const { request, policy, chamber } = input;
  return estimateSlot({
    kind: request.kind,
    cellCount: request.cellCount,
    cell: request.cell,
    holderFactor: input.holderFactor,
    setTemperatureC: input.setTemperatureC,
    chamber: { idleTemperatureC: chamber.idleTemperatureC, rampKPerMin: chamber.rampKPerMin },
    tolerance: request.tolerance,
    screening: request.screening,
    wiring: input.wiring,
    process: {
      connectFixedMin: policy.connectFixedMin,
      connectPerCellMin: policy.connectPerCellMin,
      unloadFixedMin: policy.unloadFixedMin,
      unloadPerCellMin: policy.unloadPerCellMin,
      recabledPaths: 0,
      recableMinPerPath,
      matchMin: policy.matchMin,
      matchAttended: policy.matchAttended,
      minimumMeasureMin: policy.minimumMeasureMin,
      safePercentile: policy.safePercentile,
    },
    learnedRatios: request.learnedRatios ?? null,
  });
}
