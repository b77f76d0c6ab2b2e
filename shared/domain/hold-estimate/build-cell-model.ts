import {
  arrheniusFactor,
  leakageActivationEnergyJPerMol,
} from '#shared/domain/thermal-error/arrhenius-factor.ts';
import {
  selfDischargeAPerAh,
  type CapacitanceBand,
  type EntropicBand,
} from './chemistry-figures.ts';
import type { Range } from './cell-class-figures.ts';
import { leakageReferenceC, screeningShare } from './estimate-assumptions.ts';
import { findCellClassFigures } from './find-cell-class-figures.ts';
import { findEntropicBand } from './find-entropic-band.ts';
import { findThermalFigures } from './find-thermal-figures.ts';
import {
  cellConductivityWPerMK,
  cellHeatCapacityJPerKgK,
  chamberFilmCoefficientWPerM2K,
  type ThermalFigures,
} from './thermal-figures.ts';
import { thermalTimeConstant, type ThermalTimeConstant } from './thermal-time-constant.ts';
import { timeConstant } from './time-constant.ts';
import type { EstimateInput, MeasuredCellFigures } from './types.ts';

/** Everything physical about one cell on one path, for one level of the class figures. */
export type CellModel = {
  readonly band: CapacitanceBand;
  readonly entropic: EntropicBand;
  readonly thermalFigures: ThermalFigures;
  readonly thermal: ThermalTimeConstant;
  readonly classSource: string;
  readonly capacitanceFPerAh: number;
  readonly resistanceOhmAh: number;
  readonly capacitanceF: number;
  readonly cellResistanceOhm: number;
  readonly externalResistanceOhm: number;
  readonly seriesResistanceOhm: number;
  readonly timeConstantS: number;
  readonly thermalTimeConstantS: number;
  readonly entropicVPerK: number;
  readonly entropicBoundVPerK: number;
  readonly leakageAPerAh: number;
  readonly arrhenius: number;
  readonly expectedCurrentA: number;
  readonly toleranceA: number;
  readonly allowanceA: number;
};

const nothingMeasured: MeasuredCellFigures = {
  capacitanceFPerAh: null,
  resistanceOhm: null,
  thermalTimeConstantS: null,
  entropicCoefficientVPerK: null,
  massKg: null,
  surfaceM2: null,
  selfDischargeAPerAh: null,
};

function deriveThermal(input: EstimateInput, figures: ThermalFigures): ThermalTimeConstant {
  const measured = input.cell.measured ?? nothingMeasured;
  return thermalTimeConstant({
    massKg: measured.massKg ?? figures.massKg,
    heatCapacityJPerKgK: cellHeatCapacityJPerKgK,
    filmCoefficientWPerM2K: chamberFilmCoefficientWPerM2K,
    surfaceM2: measured.surfaceM2 ?? figures.surfaceM2,
    characteristicLengthM: figures.characteristicLengthM,
    conductivityWPerMK: cellConductivityWPerMK,
    shape: figures.shape,
  });
}

function deriveTolerance(
  input: EstimateInput,
  expectedCurrentA: number,
): { readonly toleranceA: number; readonly allowanceA: number } {
  if (input.kind === 'screening') {
    const differenceA = expectedCurrentA * (input.screening.badToGoodRatio - 1);
    return { toleranceA: differenceA, allowanceA: differenceA * screeningShare };
  }
  const toleranceA =
    input.tolerance.kind === 'relative'
      ? input.tolerance.fraction * expectedCurrentA
      : input.tolerance.currentA;
  return { toleranceA, allowanceA: toleranceA };
}

/**
 * Brings cell, path and temperature together: measured figures first, else class and chemistry.
 *
 * @param input the estimate's input
 * @param options.band capacitance of the chemistry at the state of charge
 * @param options.level which of the class's figures to take
 * @param options.externalResistanceOhm R_ext of the path, Ω
 * @throws RangeError on figures out of their range
 * @example buildCellModel(input, { band, level: 'typical', externalResistanceOhm: 0.06 }).timeConstantS // 1320
 */
export function buildCellModel(
  input: EstimateInput,
  options: {
    readonly band: CapacitanceBand;
    readonly level: keyof Range;
    readonly externalResistanceOhm: number;
  },
): CellModel {
  const { cell } = input;
  const { capacityAh } = cell;
  const measured = cell.measured ?? nothingMeasured;
  const classFigures = findCellClassFigures(cell.cellClass, cell.chemistry);
  const figures = findThermalFigures(cell.format, cell.cellClass);
  const thermal = deriveThermal(input, figures);
  const entropic = findEntropicBand(cell.chemistry, cell.stateOfChargePct);
  const capacitanceFPerAh =
    measured.capacitanceFPerAh ?? options.band.capacitanceFPerAh[options.level];
  const measuredOhm = measured.resistanceOhm;
  const resistanceOhmAh =
    measuredOhm === null ? classFigures.resistanceOhmAh[options.level] : measuredOhm * capacityAh;
  const cellResistanceOhm = resistanceOhmAh / capacityAh;
  const leakageAPerAh = measured.selfDischargeAPerAh ?? selfDischargeAPerAh.typical;
  const arrhenius = arrheniusFactor({
    temperatureC: input.setTemperatureC,
    referenceC: leakageReferenceC,
    activationEnergyJPerMol: leakageActivationEnergyJPerMol,
  });
  const expectedCurrentA = leakageAPerAh * capacityAh * arrhenius;
  const measuredAlpha = measured.entropicCoefficientVPerK;
  return {
    band: options.band,
    entropic,
    thermalFigures: figures,
    thermal,
    classSource: classFigures.source,
    capacitanceFPerAh,
    resistanceOhmAh,
    capacitanceF: capacitanceFPerAh * capacityAh,
    cellResistanceOhm,
    externalResistanceOhm: options.externalResistanceOhm,
    seriesResistanceOhm: cellResistanceOhm + options.externalResistanceOhm,
    timeConstantS: timeConstant({
      capacitanceFPerAh,
      resistanceOhmAh,
      externalResistanceOhm: options.externalResistanceOhm,
      capacityAh,
    }),
    thermalTimeConstantS:
      measured.thermalTimeConstantS ?? thermal.timeConstantS * input.holderFactor,
    entropicVPerK: measuredAlpha ?? entropic.defaultVPerK,
    entropicBoundVPerK: measuredAlpha === null ? entropic.boundVPerK : Math.abs(measuredAlpha),
    leakageAPerAh,
    arrhenius,
    expectedCurrentA,
    ...deriveTolerance(input, expectedCurrentA),
  };
}
