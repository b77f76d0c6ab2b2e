import { longestNeeds } from '#shared/domain/availability/longest-needs.ts';
import { needsOfEstimate, type PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import { chooseMeterRange } from '#shared/domain/availability/choose-meter-range.ts';
import { judgeSourceStability } from '#shared/domain/checks/judge-source-stability.ts';
import { judgeMeterRange, type MeasuringNeeds } from '#shared/domain/checks/judge-meter-range.ts';
import { measuringNeeds } from '#shared/domain/checks/measuring-needs.ts';
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
  /** Of the slowest path. */
  readonly result: SingleEstimate;
  /** The longest of all paths, phase by phase. */
  readonly needs: PhaseNeeds;
};
export type RangedPath = { readonly path: DemoPath; readonly range: DemoRange };

export type BookingOrder = {
  readonly plan: ChamberPlan;
  readonly type: DemoCellType;
  readonly stateOfChargePct: number;
  readonly cellCount: number;
  readonly setC: number;
  readonly aim: Aim;
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

/** The paths that are good enough for a booking, each with the range the search would choose. */
export function findFittingPaths(
  order: BookingOrder,
  paths: readonly DemoPath[],
): readonly RangedPath[] {
  const [first] = paths;
  const widest = first?.meter.ranges.findLast((range) => range.burdenOhm !== null);
  if (first === undefined || widest === undefined) {
    return [];
  }
  const rough = estimateSlot(inputFor(order, { path: first, range: widest }));
  const needs = measuringNeeds({ kind: order.aim.kind, screening: screeningOf(order.aim) }, rough);
  if (needs === null) {
    return [];
  }
  return paths.flatMap((path) => {
    const range = findRange(path.meter.ranges, needs);
    const isSteady = judgeSourceStability(path.source, needs).outcome !== 'stop';
    return range !== undefined && isSteady ? [{ path, range }] : [];
  });
}

/** Estimates a booking on its own paths; undefined where no slot would be offered. */
export function estimateBooking(
  order: BookingOrder,
  chosen: readonly RangedPath[],
): BookingEstimate | undefined {
  const seen = new Set<string>();
  let slowest: BookingEstimate | undefined;
  for (const wired of chosen) {
    const input = inputFor(order, wired);
    const key = JSON.stringify({ ...input.wiring, label: null });
    if (seen.has(key)) {
      continue;
    }
    seen.add(key);
    const result = estimateSlot(input);
    if (result.outcome !== 'ok') {
      return undefined;
    }
    const needs = longestNeeds([needsOfEstimate(result) ?? {}, slowest?.needs ?? {}]);
    slowest =
      slowest === undefined || result.safeTotalS > slowest.result.safeTotalS
        ? { input, result, needs }
        : { ...slowest, needs };
  }
  return slowest;
}

/** The range the search would choose, if it is good enough. */
function findRange(ranges: readonly DemoRange[], needs: MeasuringNeeds): DemoRange | undefined {
  const chosen = chooseMeterRange({ ranges }, needs);
  const isGood =
    chosen?.burdenOhm !== null &&
    chosen !== null &&
    judgeMeterRange(chosen, needs).outcome !== 'stop';
  return isGood ? chosen : undefined;
}

function screeningOf(aim: Aim): EstimateInput['screening'] {
  return { badToGoodRatio: aim.badToGoodRatio, falseAlarm: 0.01, miss: 0.01 };
}

function inputFor(order: BookingOrder, wired: RangedPath): EstimateInput {
  const { type, plan } = order;
  const { path, range } = wired;
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
    screening: screeningOf(order.aim),
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
