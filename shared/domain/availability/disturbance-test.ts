import type { SearchContext } from './candidate.ts';
import type { PreparedSource } from './prepared.ts';
import { estimateNumbers } from '#shared/domain/checks/estimate-numbers.ts';
import { findStability } from '#shared/domain/checks/find-stability.ts';
import { forecastDisturbance } from '#shared/domain/checks/forecast-disturbance.ts';
import { judgeForecast } from '#shared/domain/checks/judge-forecast.ts';
import { phaseLengthS } from '#shared/domain/checks/phase-length-s.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

/**
 * A question about sources for one placement: would this source's drift, together with the chamber,
 * be a stop? Answers are kept in the context.
 *
 * @example disturbanceTest(context, facts)(source) // true for a drift of 2 µV/h
 */
export function disturbanceTest(
  context: SearchContext,
  facts: PlacementFacts,
): (source: PreparedSource) => boolean {
  const { chamber, setTemperatureC, request } = facts;
  const { policy } = facts.facility;
  const windowS = phaseLengthS(facts.phases, 'measure');
  const numbers = estimateNumbers(facts.estimate);
  const found = findStability({ chamber, policy, setTemperatureC, atMs: facts.span.startMs });
  if (found === null || numbers === null || windowS <= 0) {
    return () => false;
  }
  const base = `${numbers.timeConstantS} ${numbers.thermalTimeConstantS} ${windowS} ${chamber.id} ${found.fact.id} ${setTemperatureC}`;
  return (source) => {
    const sourceDriftVPerH = Math.abs(source.channel.stabilityVPerH ?? 0);
    const key = `${base} ${sourceDriftVPerH}`;
    const known = context.forecasts.get(key);
    if (known !== undefined) {
      return known;
    }
    const { fact } = found;
    const { verdict } = forecastDisturbance({ fact, numbers, sourceDriftVPerH, windowS });
    const disturbs = judgeForecast(verdict, request.grade, policy) === 'stop';
    context.forecasts.set(key, disturbs);
    return disturbs;
  };
}
