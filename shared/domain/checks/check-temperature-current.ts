import { estimateNumbers } from './estimate-numbers.ts';
import { findStability } from './find-stability.ts';
import { forecastDisturbance } from './forecast-disturbance.ts';
import { judgeForecast } from './judge-forecast.ts';
import { makeResult } from './make-result.ts';
import { phaseLengthS } from './phase-length-s.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatCurrent } from './words/format-current.ts';
import { formatLength } from './words/format-length.ts';

/**
 * Will chamber and source stay within the allowance over the measuring window? Three-valued: ok,
 * disturbed, log cannot tell. The newest log near the set temperature is the forecast, whatever its
 * age (its age is a check of its own); without one nothing can be judged here.
 *
 * @example checkTemperatureCurrent(facts).sentence // 'Chamber and source may induce 1.9 µA of 2.5 µA.'
 */
export function checkTemperatureCurrent(facts: PlacementFacts): CheckResult {
  const code = 'temperature-current';
  const numbers = estimateNumbers(facts.estimate);
  const windowS = phaseLengthS(facts.phases, 'measure');
  const found = findStability({
    chamber: facts.chamber,
    policy: facts.facility.policy,
    setTemperatureC: facts.setTemperatureC,
    atMs: facts.span.startMs,
  });
  if (numbers === null || found === null || windowS <= 0) {
    return makeResult(
      code,
      'caution',
      'The temperature-induced current cannot be judged without a log, an estimate and a measure phase.',
    );
  }
  const drifts = facts.paths.map(({ source }) => Math.abs(source.stabilityVPerH ?? 0));
  const forecast = forecastDisturbance({
    fact: found.fact,
    numbers,
    sourceDriftVPerH: Math.max(0, ...drifts),
    windowS,
  });
  const boundA = forecast.boundForecastA + forecast.driftA + forecast.boundWhiskerA;
  const limit = formatCurrent(forecast.allowanceA);
  const sentences = {
    ok: `Chamber and source may induce ${formatCurrent(boundA)} of ${limit}.`,
    disturbed: `Chamber and source induce about ${formatCurrent(forecast.forecastA + forecast.driftA)}; ${limit} is allowed.`,
    'cannot-tell': `The log of ${facts.chamber.tag} cannot tell: between ${formatCurrent(Math.max(0, forecast.forecastA + forecast.driftA - forecast.whiskerA))} and ${formatCurrent(boundA)}, of ${limit} allowed.`,
  };
  const outcome = judgeForecast(forecast.verdict, facts.request.grade, facts.facility.policy);
  const source = `log assessment ${found.fact.id}`;
  const couldTellS = forecast.lengthAtWhichLogCouldTellS;
  return makeResult(code, outcome, sentences[forecast.verdict], {
    used: boundA / forecast.allowanceA,
    evidence: [
      ...forecast.terms.map((term) => ({
        label: term.label,
        value: `${formatCurrent(term.defaultA)}, at most ${formatCurrent(term.boundA)}`,
        source,
      })),
      ...(couldTellS === null
        ? []
        : [{ label: 'The log could tell over', value: formatLength(couldTellS), source }]),
    ],
    waysOut: [
      { kind: 'other-path', sentence: 'Choose a steadier chamber or source.', subject: null },
      {
        kind: 'assess-log',
        sentence: `Assess a finer log of ${facts.chamber.tag}.`,
        subject: facts.chamber.tag,
      },
    ],
  });
}
