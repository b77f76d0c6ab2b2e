import { buildCellModel, type CellModel } from './build-cell-model.ts';
import { buildPhases, planSoak, type SoakPlan } from './build-phases.ts';
import type { CapacitanceBand } from './chemistry-figures.ts';
import { chemistryFigures } from './chemistry-figures.ts';
import { checkEstimateInput } from './check-estimate-input.ts';
import { computeHold, type HoldComputation } from './compute-hold.ts';
import { describeFigures } from './describe-figures.ts';
import { likelyMismatchV, longestHoldS, worstMismatchV } from './estimate-assumptions.ts';
import { externalResistance } from './external-resistance.ts';
import { findCapacitanceBand } from './find-capacitance-band.ts';
import { planMeasure, type MeasurePlan } from './plan-measure.ts';
import { predictRatio, type RatioPrediction } from './predict-ratio.ts';
import { ratioPrior } from './ratio-prior.ts';
import {
  estimateModelVersion,
  type EstimateInput,
  type EstimateNumbers,
  type HoldLimit,
  type HoldRange,
  type ImpossibleEstimate,
  type PhaseEstimate,
  type RangeEstimate,
  type SingleEstimate,
  type SlotEstimate,
  type TooLongEstimate,
} from './types.ts';
import { writeNotes } from './write-notes.ts';

/** Everything computed for one band of the capacitance. */
type Worked = {
  readonly model: CellModel;
  readonly soak: SoakPlan;
  readonly measure: MeasurePlan;
  readonly burdenOhm: number;
  readonly ratio: RatioPrediction;
  readonly runCount: number;
  readonly computed: HoldComputation;
  readonly hold: HoldRange | null;
};

type Path = { readonly resistanceOhm: number; readonly burdenOhm: number };

function numbersOf({ model, measure }: Worked): EstimateNumbers {
  return {
    expectedCurrentA: model.expectedCurrentA,
    toleranceA: model.toleranceA,
    allowanceA: model.allowanceA,
    capacitanceF: model.capacitanceF,
    seriesResistanceOhm: model.seriesResistanceOhm,
    externalResistanceOhm: model.externalResistanceOhm,
    timeConstantS: model.timeConstantS,
    thermalTimeConstantS: model.thermalTimeConstantS,
    entropicCoefficientVPerK: model.entropicVPerK,
    entropicBoundVPerK: model.entropicBoundVPerK,
    startMismatchV: likelyMismatchV,
    readingSdA: measure.readingSdA,
  };
}

function workOut(input: EstimateInput, path: Path, band: CapacitanceBand): Worked {
  const build = (level: 'low' | 'typical' | 'high'): CellModel =>
    buildCellModel(input, { band, level, externalResistanceOhm: path.resistanceOhm });
  const model = build('typical');
  const measure = planMeasure(input, model);
  const posterior = input.learnedRatios ?? ratioPrior;
  const ratio = predictRatio(posterior, input.process.safePercentile);
  const median = predictRatio(posterior, 0.5).factor;
  const { readingSdA } = measure;
  const likely = {
    entropicVPerK: model.entropicVPerK,
    mismatchV: likelyMismatchV,
    readingSdA,
  };
  const computed = computeHold(input, model, likely);
  const worst = computeHold(input, model, {
    entropicVPerK: model.entropicBoundVPerK,
    mismatchV: worstMismatchV,
    readingSdA,
  });
  const low = computeHold(input, build('low'), likely);
  const high = computeHold(input, build('high'), likely);
  const isPossible =
    computed.outcome === 'ok' &&
    worst.outcome === 'ok' &&
    low.outcome === 'ok' &&
    high.outcome === 'ok';
  return {
    model,
    soak: planSoak(input, model.thermalTimeConstantS),
    measure,
    burdenOhm: path.burdenOhm,
    ratio,
    runCount: posterior.runCount,
    computed,
    hold: isPossible
      ? {
          modelS: computed.holdS,
          likelyS: computed.holdS * median,
          safeS: computed.holdS * ratio.factor,
          lowS: low.holdS * median,
          highS: high.holdS * median,
          worstS: worst.holdS,
        }
      : null,
  };
}

function baseOf(
  input: EstimateInput,
  worked: Worked,
): Pick<SingleEstimate, 'modelVersion' | 'figures' | 'notes'> {
  return {
    modelVersion: estimateModelVersion,
    figures: describeFigures({ input, ...worked }),
    notes: writeNotes(input, worked.model, worked),
  };
}

function findLimit(
  worked: Worked,
  computed: Extract<HoldComputation, { outcome: 'ok' }>,
): HoldLimit {
  const { measureS, noiseRuleS } = worked.measure;
  if (noiseRuleS >= measureS && noiseRuleS > computed.holdS) {
    return 'noise';
  }
  if (computed.holdS === 0) {
    return 'already-settled';
  }
  return computed.thermalS > computed.electricalS ? 'thermal' : 'electrical';
}

const limitTexts: Record<HoldLimit, string> = {
  'already-settled':
    'The current starts inside the tolerance, so only the minimum measuring window remains.',
  electrical:
    'The voltage mismatch left by the match decides: it fades with the electrical time constant, which a shorter or thicker path lowers.',
  thermal:
    'The last tenth of a kelvin left by the soak decides: it fades with the thermal time constant, and a measured dU/dT or a better holder lowers it.',
  noise:
    'The noise of the meter decides: it must be averaged down to a quarter of the allowance, and a quieter range shortens it.',
};

function totalOf(phases: readonly PhaseEstimate[], key: 'likelyS' | 'safeS'): number {
  return phases.reduce((sum, phase) => sum + phase[key], 0);
}

function phasesOf(input: EstimateInput, worked: Worked, hold: HoldRange): readonly PhaseEstimate[] {
  return buildPhases(input, {
    soak: worked.soak,
    likelyHoldS: hold.likelyS,
    safeHoldS: hold.safeS,
    measureS: worked.measure.measureS,
  });
}

function hours(seconds: number): string {
  return `${Math.round(seconds / 360) / 10} h`;
}

function describeTooLong(worked: Worked, hold: HoldRange): string | null {
  if (hold.safeS > longestHoldS) {
    const cause =
      worked.burdenOhm > worked.model.cellResistanceOhm
        ? "the meter's burden lies outside the sense loop; use a path that has it inside"
        : 'widen the tolerance, ask for screening, or choose a path of lower resistance';
    return `The safe hold would be ${hours(hold.safeS)}, longer than the 72 h on offer: ${cause}.`;
  }
  if (worked.measure.measureS > longestHoldS) {
    return `The meter's noise would have to be averaged for ${hours(worked.measure.measureS)}, longer than the 72 h on offer: choose a quieter range or widen the tolerance.`;
  }
  return null;
}

function finishSingle(
  input: EstimateInput,
  worked: Worked,
  found: {
    readonly hold: HoldRange;
    readonly computed: Extract<HoldComputation, { outcome: 'ok' }>;
  },
): SingleEstimate | TooLongEstimate {
  const phases = phasesOf(input, worked, found.hold);
  const limitedBy = findLimit(worked, found.computed);
  const common = {
    ...baseOf(input, worked),
    phases,
    likelyTotalS: totalOf(phases, 'likelyS'),
    safeTotalS: totalOf(phases, 'safeS'),
    hold: found.hold,
    limitedBy,
    limitText: limitTexts[limitedBy],
    numbers: numbersOf(worked),
  };
  const reason = describeTooLong(worked, found.hold);
  return reason === null
    ? { outcome: 'ok', ...common }
    : { outcome: 'too-long', ...common, reason };
}

function finishImpossible(input: EstimateInput, worked: Worked): ImpossibleEstimate {
  return {
    outcome: 'impossible',
    ...baseOf(input, worked),
    numbers: numbersOf(worked),
    reason:
      'No length of hold lets this path tell a bad cell from a good one: the difference is smaller than the noise and resolution of the meter allow at the wanted risks; choose a more sensitive range, or accept larger risks or a larger difference.',
  };
}

function finishRange(
  input: EstimateInput,
  workedBands: readonly { readonly worked: Worked; readonly hold: HoldRange }[],
): RangeEstimate {
  const spans = workedBands
    .map(({ worked, hold }) => ({
      holdS: hold.safeS,
      totalS: totalOf(phasesOf(input, worked, hold), 'safeS'),
      label: worked.model.band.label,
      worked,
    }))
    .toSorted((first, second) => first.totalS - second.totalS);
  const shortest = spans[0];
  const longest = spans.at(-1);
  if (shortest === undefined || longest === undefined) {
    throw new RangeError('No capacitance is on record for this chemistry; add a band to it.');
  }
  return {
    outcome: 'range',
    ...baseOf(input, longest.worked),
    reason:
      'The capacitance of this chemistry changes several-fold with the state of charge, so no single length can be given.',
    question: {
      field: 'stateOfChargePct',
      text: 'At which state of charge will the cells be measured?',
    },
    shortest: { holdS: shortest.holdS, totalS: shortest.totalS, label: shortest.label },
    longest: { holdS: longest.holdS, totalS: longest.totalS, label: longest.label },
  };
}

/**
 * How long a measurement will take, phase by phase, with a likely and a safe length and the source of
 * every figure behind it. Everything is computed from the input alone, in well under a millisecond.
 *
 * - likely: typical or measured figures, default dU/dT, 2 µV mismatch of the worse sign, × the learned
 *   median ratio (1 until runs have taught otherwise);
 * - safe: the hold alone × the ratio that is long enough with the policy's probability (1.94 at 90 %
 *   before any run);
 * - worst and the low and high class figures are shown as range only.
 *
 * @returns `ok`; `too-long` when the safe hold exceeds 72 h; `range` with a question when the state of
 *   charge is missing where the capacitance depends on it; `unknown` when the burden or its place is
 *   not on record; `impossible` when no length would do
 * @throws RangeError on an input whose numbers have no meaning
 * @example estimateSlot(input).outcome // 'ok'
 */
export function estimateSlot(input: EstimateInput): SlotEstimate {
  checkEstimateInput(input);
  const path = externalResistance(input.wiring);
  if (path.outcome === 'unknown') {
    return {
      outcome: 'unknown',
      modelVersion: estimateModelVersion,
      figures: [],
      notes: [],
      reason: path.reason,
    };
  }
  const known = findCapacitanceBand(input.cell.chemistry, input.cell.stateOfChargePct);
  const isCapacitanceMeasured = (input.cell.measured?.capacitanceFPerAh ?? null) !== null;
  const bands = chemistryFigures[input.cell.chemistry].capacitance;
  const chosen = known === null ? (isCapacitanceMeasured ? bands.slice(-1) : bands) : [known];
  const results = chosen.map((band) => workOut(input, path, band));
  const holds = results.flatMap((worked) =>
    worked.hold === null ? [] : [{ worked, hold: worked.hold }],
  );
  const first = results[0];
  if (first === undefined) {
    throw new RangeError('No capacitance is on record for this chemistry; add a band to it.');
  }
  if (holds.length < results.length || first.hold === null || first.computed.outcome !== 'ok') {
    return finishImpossible(input, first);
  }
  return results.length > 1
    ? finishRange(input, holds)
    : finishSingle(input, first, { hold: first.hold, computed: first.computed });
}
