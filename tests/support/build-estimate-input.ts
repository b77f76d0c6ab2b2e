import type {
  EstimateCell,
  EstimateInput,
  MeasuredCellFigures,
} from '#shared/domain/hold-estimate/types.ts';

/** Nothing measured but what the test names. */
export function buildMeasuredFigures(
  detail: Partial<MeasuredCellFigures> = {},
): MeasuredCellFigures {
  return {
    capacitanceFPerAh: null,
    resistanceOhm: null,
    thermalTimeConstantS: null,
    entropicCoefficientVPerK: null,
    massKg: null,
    surfaceM2: null,
    selfDischargeAPerAh: null,
    ...detail,
  };
}

/** A 3.5 Ah cylindrical NMC cell with nothing measured. */
export function buildEstimateCell(detail: Partial<EstimateCell> = {}): EstimateCell {
  return {
    cellClass: 'cylindrical',
    format: '21700',
    chemistry: 'nmc811',
    capacityAh: 3.5,
    stateOfChargePct: 50,
    measured: null,
    ...detail,
  };
}

/** Four such cells at 25 °C on a quiet path with 60 mΩ of leads. */
export function buildEstimateInput(detail: Partial<EstimateInput> = {}): EstimateInput {
  return {
    kind: 'settled',
    cellCount: 4,
    cell: buildEstimateCell(),
    holderFactor: 1,
    setTemperatureC: 25,
    chamber: { idleTemperatureC: 25, rampKPerMin: 1 },
    tolerance: { kind: 'relative', fraction: 0.1 },
    screening: { badToGoodRatio: 3, falseAlarm: 0.01, miss: 0.01 },
    wiring: {
      label: 'reference wiring',
      leadResistanceOhm: 0.06,
      sourceOutputOhm: 0,
      burdenOhm: 10,
      burdenInsideLoop: true,
      meterNoiseA: 1e-7,
      meterResolutionA: 1e-9,
      sampleIntervalS: 10,
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
    ...detail,
  };
}
