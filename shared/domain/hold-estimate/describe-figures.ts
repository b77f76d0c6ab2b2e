import type { CellModel } from './build-cell-model.ts';
import type { SoakPlan } from './build-phases.ts';
import { selfDischargeSource } from './chemistry-figures.ts';
import {
  leakageReferenceC,
  likelyMismatchV,
  roomTemperatureC,
  soakToleranceK,
} from './estimate-assumptions.ts';
import type { MeasurePlan } from './plan-measure.ts';
import type { RatioPrediction } from './predict-ratio.ts';
import { cellHeatCapacityJPerKgK, chamberFilmCoefficientWPerM2K } from './thermal-figures.ts';
import type { EstimateInput, Figure, FigureInput, FigureOrigin, HoldRange } from './types.ts';

const derived = 'derived from one electrical and one thermal time constant';
const measuredSource = 'measured on this cell type';

function value(label: string, amount: number, unit: string): FigureInput {
  return { label, value: amount, unit };
}

function originOf(measured: number | null | undefined): FigureOrigin {
  return measured === null || measured === undefined ? 'class' : 'measured';
}

function sourceOf(measured: number | null | undefined, source: string): string {
  return measured === null || measured === undefined ? source : measuredSource;
}

/** Figures of the cell itself: leakage, capacitance, resistance, dU/dT. */
function describeCell(input: EstimateInput, model: CellModel): readonly Figure[] {
  const { measured, capacityAh } = input.cell;
  const leakage = measured?.selfDischargeAPerAh;
  const capacitance = measured?.capacitanceFPerAh;
  const resistance = measured?.resistanceOhm;
  const alpha = measured?.entropicCoefficientVPerK;
  return [
    {
      key: 'expected-current',
      label: 'Expected leakage current of one cell',
      value: model.expectedCurrentA,
      unit: 'A',
      formula: 'I = i_25 · Q · exp(Ea/R·(1/298.15 K − 1/T)), Ea = 60 kJ/mol',
      inputs: [
        value(`Leakage by capacity at ${leakageReferenceC} °C`, model.leakageAPerAh, 'A/Ah'),
        value('Capacity', capacityAh, 'Ah'),
        value('Set temperature', input.setTemperatureC, '°C'),
        value('Temperature factor', model.arrhenius, ''),
      ],
      source: `${sourceOf(leakage, selfDischargeSource)}; temperature: Theiler 2021, Batteries 7(2) 22`,
      origin: originOf(leakage),
    },
    {
      key: 'capacitance',
      label: 'Differential capacitance of the cell',
      value: model.capacitanceF,
      unit: 'F',
      formula: 'C = k · Q',
      inputs: [value('k', model.capacitanceFPerAh, 'F/Ah'), value('Capacity', capacityAh, 'Ah')],
      source: sourceOf(capacitance, model.band.source),
      origin: originOf(capacitance),
    },
    {
      key: 'cell-resistance',
      label: 'Long-time resistance of the cell',
      value: model.cellResistanceOhm,
      unit: 'ohm',
      formula: 'R = ρ/Q',
      inputs: [value('ρ', model.resistanceOhmAh, 'ohm·Ah'), value('Capacity', capacityAh, 'Ah')],
      source: sourceOf(resistance, model.classSource),
      origin: originOf(resistance),
    },
    {
      key: 'entropic-coefficient',
      label: 'Change of open-circuit voltage with temperature, dU/dT',
      value: model.entropicVPerK,
      unit: 'V/K',
      formula: 'α = dU/dT',
      inputs: [value('Bound on |α|', model.entropicBoundVPerK, 'V/K')],
      source: sourceOf(alpha, model.entropic.source),
      origin: originOf(alpha),
    },
  ];
}

/** Figures of the path: external resistance and electrical time constant. */
function describePath(
  input: EstimateInput,
  model: CellModel,
  burdenOhm: number,
): readonly Figure[] {
  const { wiring } = input;
  return [
    {
      key: 'external-resistance',
      label: 'Resistance of the path outside the cell',
      value: model.externalResistanceOhm,
      unit: 'ohm',
      formula: 'R_ext = leads + source output + burden outside the sense loop',
      inputs: [
        value('Leads and contacts', wiring.leadResistanceOhm, 'ohm'),
        value('Source output', wiring.sourceOutputOhm, 'ohm'),
        value('Burden outside the sense loop', burdenOhm, 'ohm'),
      ],
      source: `record of ${wiring.label}`,
      origin: 'record',
    },
    {
      key: 'time-constant',
      label: 'Electrical time constant',
      value: model.timeConstantS,
      unit: 's',
      formula: 'τ = C · (R + R_ext)',
      inputs: [
        value('C', model.capacitanceF, 'F'),
        value('R', model.cellResistanceOhm, 'ohm'),
        value('R_ext', model.externalResistanceOhm, 'ohm'),
      ],
      source: 'resistor and capacitor in series',
      origin: 'class',
    },
  ];
}

/** Figures of heat: time constant and soak. */
function describeHeat(input: EstimateInput, model: CellModel, soak: SoakPlan): readonly Figure[] {
  const measured = input.cell.measured?.thermalTimeConstantS;
  const figures = model.thermalFigures;
  return [
    {
      key: 'thermal-time-constant',
      label: 'Thermal time constant of the cell in its holder',
      value: model.thermalTimeConstantS,
      unit: 's',
      formula: 'τ_th = m·c_p/(h·A) · (1 + Bi/3 plate, 1 + Bi/4 cylinder) · holder factor',
      inputs: [
        value('Mass', input.cell.measured?.massKg ?? figures.massKg, 'kg'),
        value('Surface', input.cell.measured?.surfaceM2 ?? figures.surfaceM2, 'm²'),
        value('c_p', cellHeatCapacityJPerKgK, 'J/(kg·K)'),
        value('h', chamberFilmCoefficientWPerM2K, 'W/(m²·K)'),
        value('Biot number', model.thermal.biot, ''),
        value('Holder factor', input.holderFactor, ''),
      ],
      source: sourceOf(
        measured,
        `${figures.label}: ${figures.source}; h is common practice for fan chambers (10-40) and the weakest input`,
      ),
      origin: originOf(measured),
    },
    {
      key: 'soak',
      label: 'Soak until the cells are within 0.1 K',
      value: soak.soakS,
      unit: 's',
      formula: 't = τ_th · ln(|lag|/0.1 K)',
      inputs: [
        value('Lag at the start of the soak', Math.abs(soak.lagK), 'K'),
        value('End of the soak', soakToleranceK, 'K'),
        value('τ_th', model.thermalTimeConstantS, 's'),
        value('Cells off the idle temperature when the door closes', soak.startOffsetK, 'K'),
      ],
      source: `${derived}; cells come from a room near ${roomTemperatureC} °C and are never closer than 2 K`,
      origin: 'assumption',
    },
  ];
}

function describeAim(input: EstimateInput, model: CellModel): readonly Figure[] {
  if (input.kind === 'screening') {
    return [
      {
        key: 'difference',
        label: 'Difference between a bad and a good cell',
        value: model.toleranceA,
        unit: 'A',
        formula: 'D = I · (ratio − 1)',
        inputs: [
          value('Expected current of a good cell', model.expectedCurrentA, 'A'),
          value('Bad to good', input.screening.badToGoodRatio, ''),
        ],
        source: 'as asked in the request',
        origin: 'record',
      },
      {
        key: 'allowance',
        label: 'Allowance for disturbances',
        value: model.allowanceA,
        unit: 'A',
        formula: 'D/4',
        inputs: [value('D', model.toleranceA, 'A')],
        source: 'rule of this laboratory',
        origin: 'policy',
      },
    ];
  }
  return [
    {
      key: 'allowance',
      label: 'Tolerance of the settled current, and allowance for disturbances',
      value: model.allowanceA,
      unit: 'A',
      formula: input.tolerance.kind === 'relative' ? 'fraction · I' : 'as asked',
      inputs:
        input.tolerance.kind === 'relative'
          ? [
              value('Fraction', input.tolerance.fraction, ''),
              value('Expected current', model.expectedCurrentA, 'A'),
            ]
          : [value('Asked', input.tolerance.currentA, 'A')],
      source: 'as asked in the request',
      origin: 'record',
    },
  ];
}

function describeHold(
  input: EstimateInput,
  model: CellModel,
  computed: {
    readonly hold: HoldRange;
    readonly ratio: RatioPrediction;
    readonly runCount: number;
  },
): readonly Figure[] {
  const { hold, ratio, runCount } = computed;
  return [
    {
      key: 'model-hold',
      label: 'Hold by the physics alone',
      value: hold.modelS,
      unit: 's',
      formula:
        input.kind === 'screening'
          ? 'longer of: D(1−x) = Z·√((a·x)² + s_m²), and thermal lag ≤ D/4'
          : '(|dV0|/R_s + I)·e^(−t/τ) + C·|α|·0.1 K·|e^(−t/τ_th) − e^(−t/τ)|/|τ_th − τ| ≤ tolerance',
      inputs: [
        value('Start mismatch', likelyMismatchV, 'V'),
        value('R_s', model.seriesResistanceOhm, 'ohm'),
        value('τ', model.timeConstantS, 's'),
        value('τ_th', model.thermalTimeConstantS, 's'),
        value('α', model.entropicVPerK, 'V/K'),
        value('Allowance', model.allowanceA, 'A'),
      ],
      source: derived,
      origin: 'class',
    },
    {
      key: 'safe-factor',
      label: 'Safe hold over the model',
      value: ratio.factor,
      unit: '',
      formula: 'exp(m + t(p, 2a)·scale)',
      inputs: [
        value('p', input.process.safePercentile, ''),
        value('Runs learned from', runCount, ''),
        value('Scale', ratio.scale, ''),
        value('Degrees of freedom', ratio.degreesOfFreedom, ''),
      ],
      source:
        runCount > 0
          ? 'learned from the runs of this cell type or class (K. Murphy 2007, conjugate Gaussian)'
          : 'no runs yet: prior with P90/P50 = 1.94, which stands for what the model does not know',
      origin: runCount > 0 ? 'learned' : 'policy',
    },
    {
      key: 'worst-hold',
      label: 'Hold in the worst case, shown only',
      value: hold.worstS,
      unit: 's',
      formula: 'as the model, with the bound of α and a mismatch of 10 µV',
      inputs: [value('Bound on |α|', model.entropicBoundVPerK, 'V/K')],
      source: model.entropic.source,
      origin: 'assumption',
    },
  ];
}

function describeMeasure(input: EstimateInput, measure: MeasurePlan): Figure {
  return {
    key: 'measure',
    label: 'Measuring window',
    value: measure.measureS,
    unit: 's',
    formula: 'max(minimum, (s/u)²·δ), u = allowance/4',
    inputs: [
      value('Minimum', input.process.minimumMeasureMin * 60, 's'),
      value('s, one reading', measure.singleReadingSdA, 'A'),
      value('u, target', measure.targetA, 'A'),
      value('δ, reading interval', input.wiring.sampleIntervalS, 's'),
    ],
    source: `record of ${input.wiring.label}; readings taken as independent`,
    origin: measure.noiseRuleS > input.process.minimumMeasureMin * 60 ? 'record' : 'policy',
  };
}

/**
 * Every figure an estimate rests on, with formula, inputs, source and origin, in the order a reader
 * would follow it.
 *
 * @example describeFigures({ input, model, ... }).map((figure) => figure.key)
 */
export function describeFigures(estimate: {
  readonly input: EstimateInput;
  readonly model: CellModel;
  readonly burdenOhm: number;
  readonly soak: SoakPlan;
  readonly measure: MeasurePlan;
  readonly hold: HoldRange | null;
  readonly ratio: RatioPrediction;
  readonly runCount: number;
}): readonly Figure[] {
  const { input, model, hold } = estimate;
  return [
    ...describeCell(input, model),
    ...describeAim(input, model),
    ...describePath(input, model, estimate.burdenOhm),
    ...describeHeat(input, model, estimate.soak),
    ...(hold === null ? [] : describeHold(input, model, { ...estimate, hold })),
    describeMeasure(input, estimate.measure),
  ];
}
