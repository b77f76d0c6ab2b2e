import { findStability } from './find-stability.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Was the chamber's stability logged near the set temperature, not longer before the slot than the
 * site's policy allows (90 days and ±0.5 °C by default)?
 *
 * @example checkStabilityLogged(facts).sentence // 'The last stability log of C02 at 45 °C is 97 days old, the limit is 90.'
 */
export function checkStabilityLogged(facts: PlacementFacts): CheckResult {
  const { chamber, setTemperatureC } = facts;
  const { policy } = facts.facility;
  const code = 'stability-logged';
  const place = `${chamber.tag} at ${formatTemperature(setTemperatureC)}`;
  const waysOut = [
    { kind: 'assess-log', sentence: `Assess a log of ${place}.`, subject: chamber.tag },
    { kind: 'other-path', sentence: 'Choose another chamber.', subject: chamber.tag },
  ] as const;
  const found = findStability({ chamber, policy, setTemperatureC, atMs: facts.span.startMs });
  if (found === null) {
    return makeResult(
      code,
      'stop',
      `No stability log of ${chamber.tag} lies within ±${policy.stabilityTemperatureWindowK} K of ${formatTemperature(setTemperatureC)}.`,
      { waysOut },
    );
  }
  const days = Math.floor(found.ageDays);
  const evidence = [
    {
      label: 'Logged at',
      value: `${formatTemperature(found.fact.setTemperatureC)} for ${found.fact.hoursLogged} h`,
      source: `log assessment ${found.fact.id}`,
    },
  ];
  const used = found.ageDays / policy.stabilityMaxAgeDays;
  if (!found.isInDate) {
    return makeResult(
      code,
      'stop',
      `The last stability log of ${place} is ${Math.ceil(found.ageDays)} days old at the start, the limit is ${policy.stabilityMaxAgeDays}.`,
      { evidence, waysOut, used },
    );
  }
  return makeResult(
    code,
    'pass',
    `The stability of ${place} was logged ${days} days before the start, of ${policy.stabilityMaxAgeDays} allowed.`,
    { evidence, used },
  );
}
