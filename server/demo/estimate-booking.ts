import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type {
  EstimateInput,
  MeasuredCellFigures,
  MeasurementKind,
  ProcessTimes,
  SingleEstimate,
  Tolerance,
} from '#shared/domain/hold-estimate/types.ts';
import { policyDefinitions } from '#shared/domain/policies/site-policy.ts';
import type { DemoRange } from './channel-plan.ts';
import type { DemoCellType } from './cell-types.ts';
import type { DemoPath } from './wiring.ts';
import type { ChamberPlan } from './chamber-plan.ts';

export type Aim = {
  readonly kind: MeasurementKind;
  readonly tolerance: Tolerance;
  readonly badToGoodRatio: number;
};
export type BookingEstimate = {
  readonly input: EstimateInput;
  readonly result: SingleEstimate;
  readonly rangeOf: (path: DemoPath) => DemoRange;
};

const process: ProcessTimes = {
  connectFixedMin: policyDefinitions.connectFixedMin.fallback,
  connectPerCellMin: policyDefinitions.connectPerCellMin.fallback,
  unloadFixedMin: policyDefinitions.unloadFixedMin.fallback,
  unloadPerCellMin: policyDefinitions.unloadPerCellMin.fallback,
  recabledPaths: 0,
  recableMinPerPath: 5,
  matchMin: policyDefinitions.matchMin.fallback,
  matchAttended: policyDefinitions.matchAttended.fallback,
  minimumMeasureMin: policyDefinitions.minimumMeasureMin.fallback,
  safePercentile: policyDefinitions.safePercentile.fallback / 100,
};

/** Estimates a booking on its own paths; undefined where no slot would be offered. */
export function estimateBooking(order: {
  readonly plan: ChamberPlan;
  readonly type: DemoCellType;
  readonly stateOfChargePct: number;
  readonly cellCount: number;
  readonly path: DemoPath;
  readonly setC: number;
  readonly aim: Aim;
}): BookingEstimate | undefined {
  const widest = order.path.meter.ranges.at(-1);
  if (widest === undefined) {
    return undefined;
  }
  const rough = estimateSlot(inputFor(order, widest));
  if (rough.outcome !== 'ok') {
    return undefined;
  }
  const { expectedCurrentA } = rough.numbers;
  const range = findRange(order.path.meter.ranges, expectedCurrentA);
  if (range?.burdenOhm === undefined || range.burdenOhm === null) {
    return undefined;
  }
  const input = inputFor(order, range);
  const result = estimateSlot(input);
  if (result.outcome !== 'ok') {
    return undefined;
  }
  function rangeOf(path: DemoPath): DemoRange {
    const found = findRange(path.meter.ranges, expectedCurrentA);
    if (found === undefined) {
      throw new RangeError(`${path.meter.label} has no range for ${expectedCurrentA} A.`);
    }
    return found;
  }
  return { input, result, rangeOf };
}

/** The narrowest range that leaves a margin above the expected current. */
function findRange(ranges: readonly DemoRange[], currentA: number): DemoRange | undefined {
  return ranges.find((range) => range.fullScaleA >= 1.5 * currentA);
}

function inputFor(order: Parameters<typeof estimateBooking>[0], range: DemoRange): EstimateInput {
  const { type, path, plan } = order;
  return {
    kind: order.aim.kind,
    cellCount: order.cellCount,
    cell: {
      cellClass: type.cellClass,
      format: type.format,
      chemistry: type.chemistry,
      capacityAh: type.capacityAh,
      stateOfChargePct: order.stateOfChargePct,
      measured: measuredFigures(type),
    },
    holderFactor: plan.holderFactor,
    setTemperatureC: order.setC,
    chamber: { idleTemperatureC: 25, rampKPerMin: plan.rampKPerMin },
    tolerance: order.aim.tolerance,
    screening: { badToGoodRatio: order.aim.badToGoodRatio, falseAlarm: 0.01, miss: 0.01 },
    wiring: {
      label: `${path.source.label} to ${path.positionLabel}`,
      leadResistanceOhm: path.leadResistanceOhm,
      sourceOutputOhm: path.source.sourceOutputOhm,
      burdenOhm: range.burdenOhm,
      burdenInsideLoop: range.burdenInsideLoop,
      meterNoiseA: range.noiseA,
      meterResolutionA: range.resolutionA,
      sampleIntervalS: range.sampleIntervalS,
    },
    process,
    learnedRatios: null,
  };
}

function measuredFigures(type: DemoCellType): MeasuredCellFigures | null {
  const { measured } = type;
  if (Object.keys(measured).length === 0) {
    return null;
  }
  return {
    capacitanceFPerAh: measured.capacitanceFPerAh ?? null,
    resistanceOhm: measured.resistanceOhm ?? null,
    thermalTimeConstantS: measured.thermalTimeConstantS ?? null,
    entropicCoefficientVPerK: measured.entropicCoefficientVPerK ?? null,
    massKg: measured.massKg ?? null,
    surfaceM2: measured.surfaceM2 ?? null,
    selfDischargeAPerAh: measured.selfDischargeAPerAh ?? null,
  };
}
