import { buildIndex } from '#shared/domain/availability/build-index.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { PathChoice, PlacementFacts } from '#shared/domain/checks/types.ts';
import type { Chamber, Facility } from '#shared/domain/facility/types.ts';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type { EstimateInput, SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import {
  buildChamber,
  buildFacility,
  buildMeter,
  buildPanel,
  buildPhaseSpans,
  buildPosition,
  buildRange,
  buildSlotRequest,
  buildSource,
  hourMs,
  mondayMs,
} from './build-facility.ts';

/** The estimate of a request on reference wiring, at the chamber's own ramp. */
export function buildEstimate(
  request: SlotRequest,
  change: Partial<EstimateInput> = {},
): SlotEstimate {
  return estimateSlot({
    kind: request.kind,
    cellCount: request.cellCount,
    cell: request.cell,
    holderFactor: 1,
    setTemperatureC: request.setTemperatureC,
    chamber: { idleTemperatureC: 25, rampKPerMin: 1 },
    tolerance: request.tolerance,
    screening: request.screening,
    wiring: {
      label: 'reference wiring',
      leadResistanceOhm: 0.05,
      sourceOutputOhm: 0.01,
      burdenOhm: 10,
      burdenInsideLoop: true,
      meterNoiseA: 1e-8,
      meterResolutionA: 1e-9,
      sampleIntervalS: 1,
    },
    process: {
      connectFixedMin: 10,
      connectPerCellMin: 3,
      unloadFixedMin: 10,
      unloadPerCellMin: 3,
      recabledPaths: 0,
      recableMinPerPath: 5,
      matchMin: 20,
      matchAttended: false,
      minimumMeasureMin: 60,
      safePercentile: 0.9,
    },
    learnedRatios: null,
    ...change,
  });
}

export function buildPath(change: Partial<PathChoice> = {}): PathChoice {
  const range = change.range ?? buildRange();
  return {
    panel: buildPanel(),
    source: buildSource(),
    meter: buildMeter({ ranges: [range] }),
    range,
    position: buildPosition(),
    ...change,
  };
}

/** One cell on one path in C01, Monday 09:00 to 17:00 at 25 °C: every check passes or cautions. */
export function buildPlacement(
  change: Partial<Omit<PlacementFacts, 'index' | 'request' | 'chamber' | 'facility'>> & {
    readonly request?: Partial<SlotRequest>;
    readonly chamber?: Partial<Chamber>;
    readonly facility?: Partial<Facility>;
  } = {},
): PlacementFacts {
  const request = buildSlotRequest(change.request);
  const chamber = buildChamber(change.chamber);
  const facility = buildFacility({ chambers: [chamber], ...change.facility });
  const startMs = mondayMs + 9 * hourMs;
  const phases =
    change.phases ??
    buildPhaseSpans(startMs, request.setTemperatureC, [
      ['connect', 15],
      ['match', 20],
      ['hold', 340],
      ['measure', 60],
      ['wait', 30],
      ['unload', 15],
    ]);
  return {
    joins: null,
    paths: [buildPath()],
    span: { startMs: phases[0]?.startMs ?? startMs, endMs: phases.at(-1)?.endMs ?? startMs },
    setTemperatureC: request.setTemperatureC,
    estimate: buildEstimate(request),
    nowMs: mondayMs + 7 * hourMs,
    ignoreBookingId: null,
    ...change,
    phases,
    facility,
    index: buildIndex(facility),
    request,
    chamber,
  };
}
