import type { StabilityFact } from '#shared/domain/facility/types.ts';
import type { EstimateNumbers } from '#shared/domain/hold-estimate/types.ts';
import { assessForecast } from '#shared/domain/thermal-error/assess-forecast.ts';
import { sensorPlaces } from '#shared/domain/thermal-error/types.ts';
import type { ForecastAssessment } from '#shared/domain/thermal-error/types.ts';

/**
 * Forecast of the current that chamber and source will induce over the measuring window. A sensor
 * whose place is not recorded in the known words is taken to sit on the cell, so that no damping by
 * the cell's mass is credited.
 *
 * @param input.sourceDriftVPerH largest drift of the paths, V/h
 * @param input.windowS length of the measure phase, s
 * @example forecastDisturbance({ fact, numbers, sourceDriftVPerH: 1e-7, windowS: 3600 }).verdict
 */
export function forecastDisturbance(input: {
  readonly fact: StabilityFact;
  readonly numbers: EstimateNumbers;
  readonly sourceDriftVPerH: number;
  readonly windowS: number;
}): ForecastAssessment {
  const { fact, numbers } = input;
  return assessForecast({
    stability: {
      driftKPerH: fact.driftKPerH,
      halfBandK: fact.halfBandK,
      periodS: fact.periodS,
      resolutionK: fact.resolutionK,
      hoursLogged: fact.hoursLogged,
      sensorPlace: sensorPlaces.find((place) => place === fact.sensorPlace) ?? 'cell',
    },
    sourceDriftUvPerH: input.sourceDriftVPerH * 1e6,
    capacitanceF: numbers.capacitanceF,
    entropicCoefficientVPerK: numbers.entropicCoefficientVPerK,
    entropicBoundVPerK: numbers.entropicBoundVPerK,
    thermalTimeConstantS: numbers.thermalTimeConstantS,
    timeConstantS: numbers.timeConstantS,
    windowS: input.windowS,
    allowanceA: numbers.allowanceA,
  });
}
