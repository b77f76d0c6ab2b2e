import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { requireWithin } from '#shared/domain/quantities/require-within.ts';
import { toKelvin } from '#shared/domain/quantities/to-kelvin.ts';
import type { EstimateInput, MeasuredCellFigures } from './types.ts';

const measuredPositive = [
  'capacitanceFPerAh',
  'resistanceOhm',
  'thermalTimeConstantS',
  'massKg',
  'surfaceM2',
  'selfDischargeAPerAh',
] as const satisfies readonly (keyof MeasuredCellFigures)[];

const processNotNegative = [
  'connectFixedMin',
  'connectPerCellMin',
  'unloadFixedMin',
  'unloadPerCellMin',
  'recabledPaths',
  'recableMinPerPath',
  'matchMin',
] as const;

function checkCell(cell: EstimateInput['cell']): void {
  requirePositive(cell.capacityAh, 'capacityAh');
  if (cell.stateOfChargePct !== null) {
    requireWithin(cell.stateOfChargePct, 'stateOfChargePct', { low: 0, high: 100 });
  }
  if (cell.measured === null) {
    return;
  }
  for (const key of measuredPositive) {
    const value = cell.measured[key];
    if (value !== null) {
      requirePositive(value, key);
    }
  }
  if (cell.measured.entropicCoefficientVPerK !== null) {
    requireFinite(cell.measured.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  }
}

function checkAim(input: EstimateInput): void {
  if (input.kind === 'screening') {
    const { badToGoodRatio } = input.screening;
    if (!(requireFinite(badToGoodRatio, 'badToGoodRatio') > 1)) {
      throw new RangeError('A bad cell must leak more than a good one: the ratio must exceed 1.');
    }
  } else if (input.tolerance.kind === 'relative') {
    requirePositive(input.tolerance.fraction, 'tolerance.fraction');
  } else {
    requirePositive(input.tolerance.currentA, 'tolerance.currentA');
  }
}

/**
 * Refuses an estimate input whose numbers have no meaning.
 *
 * @throws RangeError with a sentence naming the figure
 * @example checkEstimateInput(input) // nothing, or a RangeError
 */
export function checkEstimateInput(input: EstimateInput): void {
  if (!Number.isInteger(input.cellCount) || input.cellCount < 1) {
    throw new RangeError(`cellCount must be a whole number of at least 1, not ${input.cellCount}.`);
  }
  checkCell(input.cell);
  checkAim(input);
  requirePositive(input.holderFactor, 'holderFactor');
  toKelvin(input.setTemperatureC);
  toKelvin(input.chamber.idleTemperatureC);
  requirePositive(input.chamber.rampKPerMin, 'rampKPerMin');
  requireNotNegative(input.wiring.meterNoiseA, 'meterNoiseA');
  requireNotNegative(input.wiring.meterResolutionA, 'meterResolutionA');
  requirePositive(input.wiring.sampleIntervalS, 'sampleIntervalS');
  for (const key of processNotNegative) {
    requireNotNegative(input.process[key], key);
  }
  requirePositive(input.process.minimumMeasureMin, 'minimumMeasureMin');
  requireWithin(input.process.safePercentile, 'safePercentile', { low: 0.5, high: 0.95 });
}
